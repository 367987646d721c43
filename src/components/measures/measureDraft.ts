import { handWords, placeWords, sideWords, trialWords } from '@/components/measures/measureWords.ts'
import { seatingGroups, seatingLabels } from '@/components/measures/seatingFields.ts'
import { sideGroups } from '@/components/measures/sideGroups.ts'
import { lightSideLabels, yesNoLabels } from '@/components/writingObservations/observationLabels.ts'
import { formatDay, type Day } from '@shared/days.ts'
import { countedTrials, leastTrials } from '@shared/handSkill.ts'
import type { MeasureDraft } from '@shared/measureSchemas.ts'
import type {
  MeasureDetails,
  MeasureView,
  Reach,
  SeatingDetails,
  SidesDetails,
  SkillDetails,
  Tries,
} from '@shared/measures.ts'

/** A draft as it is being filled: the day may be empty for a moment. */
export type MeasureInWork = Omit<MeasureDraft, 'measuredOn'> & { measuredOn: Day | null }

/** Only what may be written; score, lock and rights stay behind. Recorders replace the details and never write into them. */
export const draftOf = ({ measuredOn, details, notDoneReason, comment }: MeasureView): MeasureDraft => ({
  measuredOn,
  details,
  notDoneReason,
  comment,
})

interface Part {
  label: string
  mine: string
  theirs: string
}

/** One reach in words: 'far left: right hand, swapped'. */
export const reachLine = ({ place, hand, swapped }: Reach): string =>
  `${placeWords[place].toLowerCase()}: ${hand === null ? 'lost' : `${hand} hand`}${swapped ? ', swapped' : ''}`

const numbered = (lines: string[]) =>
  lines.length === 0 ? 'nothing recorded' : lines.map((line, index) => `${index + 1}. ${line}`).join('\n')

const trialLines = ({ kind, trials }: SkillDetails) =>
  trials.map(
    ({ hand, value, interrupted }) =>
      `${hand} hand: ${value === null ? 'not taken' : trialWords(kind, value)}${interrupted ? ', interrupted' : ''}`,
  )

export const triesOf = (details: SidesDetails, group: 'foot' | 'eye' | 'ear', action: string): Tries =>
  (details[group] as Record<string, Tries>)[action] ?? [null, null, null]

const sideParts = (details: SidesDetails) => [
  ...sideGroups.flatMap(({ id, actions }) =>
    actions.map(({ action, words }) => ({
      label: words,
      text: triesOf(details, id, action)
        .map((side) => (side === null ? 'not done' : sideWords[side].toLowerCase()))
        .join(', '),
    })),
  ),
  {
    label: 'Distance of the far target',
    text: details.eyeFarMetres === null ? 'empty' : `${details.eyeFarMetres} m`,
  },
]

const seatingParts = (details: SeatingDetails) => [
  ...seatingGroups.flatMap(({ fields }) =>
    fields.map(({ name, label }) => ({
      label,
      text: details[name] === null ? 'empty' : `${details[name]} cm`,
    })),
  ),
  { label: 'Feet flat', text: details.feetFlat === null ? 'not looked at' : yesNoLabels[details.feetFlat] },
  {
    label: 'Neighbour on the left writes with',
    text: details.neighbourHand === null ? 'empty' : handWords[details.neighbourHand],
  },
  {
    label: 'Light from',
    text: details.lightSide === null ? 'not looked at' : lightSideLabels[details.lightSide],
  },
]

const recorded = (details: MeasureDetails): { label: string; text: string }[] => {
  switch (details.kind) {
    case 'reaching':
      return [{ label: 'Reaches', text: numbered(details.reaches.map(reachLine)) }]
    case 'sides':
      return sideParts(details)
    case 'seating':
      return seatingParts(details)
    default:
      return [{ label: 'Trials', text: numbered(trialLines(details)) }]
  }
}

const lines = ({ measuredOn, details, notDoneReason, comment }: MeasureInWork) => [
  ...recorded(details),
  { label: 'Taken on', text: measuredOn === null ? 'empty' : formatDay(measuredOn) },
  {
    label: 'Not done, because',
    text: notDoneReason === null || notDoneReason === '' ? 'empty' : notDoneReason,
  },
  { label: 'Comment', text: comment === null || comment === '' ? 'empty' : comment },
]

/** Where two people's records of one occasion differ, in full. */
export function differingParts(mine: MeasureInWork, theirs: MeasureInWork): Part[] {
  const others = lines(theirs)
  return lines(mine)
    .map(({ label, text }, index) => ({ label, mine: text, theirs: others[index]?.text ?? 'empty' }))
    .filter((part) => part.mine !== part.theirs)
}

const skillGaps = (details: SkillDetails): string[] =>
  (['left', 'right'] as const).flatMap((hand) => {
    const count = countedTrials(details.trials, hand).length
    return count >= leastTrials ? [] : [`${handWords[hand]} hand: ${count} of ${leastTrials} trials count.`]
  })

const sideGaps = (details: SidesDetails): string[] => {
  const open = sideGroups.flatMap(({ id, actions }) =>
    actions.flatMap(({ action, words }) => {
      const done = triesOf(details, id, action).filter((side) => side !== null).length
      return done === 3 ? [] : [`${words}: ${done} of 3 tries.`]
    }),
  )
  const far = details.eye.far.some((side) => side !== null) && details.eyeFarMetres === null
  return far ? [...open, 'The distance of the far target is missing.'] : open
}

const seatingGaps = (details: SeatingDetails): string[] => {
  const names = seatingGroups
    .flatMap(({ fields }) => fields)
    // A measure in shoes has nothing to add, and stature only stands in for the knee.
    .filter(({ name }) => name !== 'shoeCm' && name !== 'statureCm')
    .filter(({ name }) => details[name] === null)
    .map(({ name }) => seatingLabels[name].toLowerCase())
  return names.length === 0 ? [] : [`Not measured: ${names.join(', ')}.`]
}

/** What is still open, for the person who is about to sign. Nothing here stands in the way. */
export function gapsOf(details: MeasureDetails): string[] {
  switch (details.kind) {
    case 'reaching': {
      const open = details.cardsPerPlace * 7 - details.reaches.length
      const lost = details.reaches.filter(({ hand }) => hand === null).length
      return [
        ...(open > 0 ? [`${open} of ${details.cardsPerPlace * 7} reaches are not recorded.`] : []),
        ...(lost > 0
          ? [`${lost} ${lost === 1 ? 'reach was lost and stays' : 'reaches were lost and stay'} out.`]
          : []),
      ]
    }
    case 'sides':
      return sideGaps(details)
    case 'seating':
      return seatingGaps(details)
    default:
      return skillGaps(details)
  }
}

/** Is every trial that belongs to it taken? Lost reaches were taken too. */
export const isComplete = (details: MeasureDetails): boolean =>
  details.kind === 'reaching'
    ? details.reaches.length === details.cardsPerPlace * 7
    : gapsOf(details).length === 0
