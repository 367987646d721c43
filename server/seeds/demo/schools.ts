import type { TeacherKey } from './people.ts'

export const classKeys = ['robin', 'wren', 'finch', 'otter', 'heron', 'badger', '7a', '8c', '9b'] as const
export type ClassKey = (typeof classKeys)[number]

export interface DemoSchool {
  name: string
  town: string
  teacher: TeacherKey
  classes: { key: ClassKey; name: string; ages: string }[]
}

export const schools: readonly DemoSchool[] = [
  {
    name: 'Larkwater Infant School',
    town: 'Harrowmere',
    teacher: 'siobhan',
    classes: [
      { key: 'robin', name: 'Robin', ages: '4–5' },
      { key: 'wren', name: 'Wren', ages: '5–6' },
      { key: 'finch', name: 'Finch', ages: '6–7' },
    ],
  },
  {
    name: 'Thistlebank Primary',
    town: 'Harrowmere',
    teacher: 'kwabena',
    classes: [
      { key: 'otter', name: 'Otter', ages: '7–8' },
      { key: 'heron', name: 'Heron', ages: '8–9' },
      { key: 'badger', name: 'Badger', ages: '9–11' },
    ],
  },
  {
    name: 'Brindlemoor High',
    town: 'Harrowmere',
    teacher: 'hyejin',
    classes: [
      { key: '7a', name: '7A', ages: '11–12' },
      { key: '8c', name: '8C', ages: '12–13' },
      { key: '9b', name: '9B', ages: '13–14' },
    ],
  },
]

/** First year of the school year a day falls in: school years begin in September. */
export const schoolYearOf = (day: string): number =>
  Number(day.slice(0, 4)) - (Number(day.slice(5, 7)) < 9 ? 1 : 0)
