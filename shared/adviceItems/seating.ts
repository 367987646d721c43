import { measure, whenTrue, type AdviceItem } from '../adviceItem.ts'

const sattler = 'Sattler, basic rules for left-handed children (extract)'
const teachers = 'Teachers’ guidance, 1999 and 2019, and a primary school’s page'
const therapySheets = 'Children’s therapy handwriting sheets'
const severalSources = 'Agreed by several practice sources'

/** Clinic rules, not published figures: free space beside the writing arm and the turn of the seat to the board. */
const leftSpaceCm = 40
const boardTurnDegrees = 45
/** Desk above the bent elbow: 2.5 to 5 cm in a school therapists' note (printed as 1 to 2, read as inches). */
const deskRangeCm = { least: 2.5, most: 5 } as const

/** Where the child sits. Left and right are as the pupil facing the board sees them; nobody is asked to use another hand. */
export const seatingItems: readonly AdviceItem[] = [
  {
    id: 'S01',
    text: 'Give the left seat of a shared desk, the left end of a table, or a place beside another left-hander.',
    because: 'Two writing elbows then do not meet in the middle.',
    audiences: ['teacher'],
    ageFrom: 4,
    ageTo: 14,
    caution: 'Left as the child facing the board sees it.',
    grade: 'professional_consensus',
    source: `${sattler}; ${teachers}. One published sheet prints it the other way round`,
    needsLeftWriter: true,
    leftToRightOnly: false,
    offeredFor: ({ elbowClash, deskType, seatSide }) => {
      if (elbowClash === true) return 'two writing elbows meet at the desk'
      return deskType === 'double' && seatSide !== 'left' ? 'the child sits at a desk for two' : null
    },
  },
  {
    id: 'S02',
    text: `Keep about ${leftSpaceCm} cm free on the child’s left: no wall, cupboard or window sill.`,
    because: 'The left arm swings out to that side when it writes.',
    audiences: ['teacher'],
    ageFrom: 4,
    ageTo: 14,
    caution: null,
    grade: 'professional_consensus',
    source: `${teachers}; ${therapySheets}. The centimetres are this clinic’s figure`,
    needsLeftWriter: true,
    leftToRightOnly: false,
    offeredFor: ({ leftClearanceCm }) =>
      leftClearanceCm !== null && leftClearanceCm < leftSpaceCm
        ? `there are only ${measure(leftClearanceCm, 'cm')} free on the left`
        : null,
  },
  {
    id: 'S03',
    text: 'Seat the child so that the board is seen without twisting.',
    because: 'A page turned for the left hand and a board off to one side pull the body two ways.',
    audiences: ['teacher'],
    ageFrom: 4,
    ageTo: 14,
    caution: 'Look again once the page has been turned.',
    grade: 'common_practice',
    source: teachers,
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: ({ boardAngleDegrees }) =>
      boardAngleDegrees !== null && Math.abs(boardAngleDegrees) > boardTurnDegrees
        ? `the seat is turned ${measure(Math.abs(boardAngleDegrees), '°')} away from the board`
        : null,
  },
  {
    id: 'S04',
    text: 'Let the main light come from the right or from above.',
    because: 'Light from the left throws the hand’s shadow on the line.',
    audiences: ['teacher', 'parent'],
    ageFrom: 5,
    ageTo: 14,
    caution: 'Watch for glare on screens.',
    grade: 'common_practice',
    source: 'School-hygiene textbook and a lighting guide: the right-hander’s rule, mirrored',
    needsLeftWriter: true,
    leftToRightOnly: false,
    offeredFor: ({ lightSide }) => (lightSide === 'left' ? 'the main light comes from the left' : null),
  },
  {
    id: 'S05',
    text: 'Feet flat on the floor or a footrest, and the desk just above the bent elbow (about 2.5 to 5 cm).',
    because: 'A steady seat frees the arms for writing.',
    audiences: ['teacher', 'parent'],
    ageFrom: 4,
    ageTo: 14,
    caution: 'Try a footrest before new furniture.',
    grade: 'professional_consensus',
    source:
      'Parcells et al. 1999 (abstract: few pupils fit their desks); school therapists’ notes for the heights',
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: ({ feetFlat, deskAboveElbowCm }) => {
      if (feetFlat === false) return 'the feet are not flat'
      if (deskAboveElbowCm === null) return null
      if (deskAboveElbowCm > deskRangeCm.most)
        return `the desk is high (${measure(deskAboveElbowCm, 'cm')} above the bent elbow)`
      if (deskAboveElbowCm < 0)
        return `the desk is low (${measure(-deskAboveElbowCm, 'cm')} below the bent elbow)`
      return deskAboveElbowCm < deskRangeCm.least
        ? `the desk is low (${measure(deskAboveElbowCm, 'cm')} above the bent elbow)`
        : null
    },
  },
  {
    id: 'S06',
    text: 'Give a table, or a chair with the tablet on its left; never a tablet on the right arm.',
    because: 'On a right-arm tablet a left-hander writes across the body with nothing under the elbow.',
    audiences: ['teacher'],
    ageFrom: 10,
    ageTo: 14,
    caution: 'Order early: such chairs take time to come.',
    grade: 'common_practice',
    source: severalSources,
    needsLeftWriter: true,
    leftToRightOnly: false,
    offeredFor: ({ deskType, tabletSide }) =>
      deskType === 'side_tablet' && tabletSide === 'right' ? 'the chair has its tablet on the right' : null,
  },
  {
    id: 'S07',
    text: 'Spread left-handers over the room like everyone else; no "left-handers’ table".',
    because: 'Nobody wants to be seated by a hand, and good places exist all over the room.',
    audiences: ['teacher'],
    ageFrom: 4,
    ageTo: 14,
    caution: 'Children may ask to sit together.',
    grade: 'common_practice',
    source: 'This clinic’s own rule',
    needsLeftWriter: true,
    leftToRightOnly: false,
    offeredFor: ({ leftHandersGrouped }) =>
      whenTrue(leftHandersGrouped, 'the left-handers sit together as a group'),
  },
]
