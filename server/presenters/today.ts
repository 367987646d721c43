import { attentionLevels } from '../../shared/attention.ts'
import { actOfTask } from '../../shared/tasks.ts'
import type { TodayItem, TodayView } from '../../shared/today.ts'
import type { TodayGroupRows } from '../queries/today.ts'
import { presentWorkItem, type WorkClock } from './workItems.ts'

/** Hours of the clinic's day at which the greeting changes. */
const noon = 12
const evening = 18

const hourOf = (now: Date, timeZone: string): number =>
  Number(new Intl.DateTimeFormat('en-GB', { timeZone, hour: '2-digit', hourCycle: 'h23' }).format(now))

const greeting = ({ now, settings }: WorkClock): string => {
  const hour = hourOf(now, settings.timeZone)
  if (hour < noon) return 'Good morning'
  return hour < evening ? 'Good afternoon' : 'Good evening'
}

const presentGroup = ({ id, label, list, rows, total }: TodayGroupRows, clock: WorkClock) => ({
  id,
  label,
  total,
  items: rows
    .map((row): TodayItem => {
      const { id: itemId, title, detail, level, to } = presentWorkItem(list, row, clock)
      return {
        id: itemId,
        title,
        detail,
        level,
        to,
        taskId: list === 'tasks' && row.kind !== null && actOfTask(row.kind) === null ? row.id : null,
      }
    })
    .toSorted((a, b) => attentionLevels.indexOf(b.level) - attentionLevels.indexOf(a.level)),
})

/** Groups with nothing in them are left out, so that an empty page means an empty day. */
export const presentToday = (
  groups: readonly TodayGroupRows[],
  displayName: string,
  clock: WorkClock,
): TodayView => ({
  greeting: `${greeting(clock)}, ${displayName.split(' ')[0]}`,
  groups: groups.filter((group) => group.total > 0).map((group) => presentGroup(group, clock)),
})
