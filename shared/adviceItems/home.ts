import { whenTrue, type AdviceItem } from '../adviceItem.ts'

const sattler = 'Sattler, basic rules for left-handed children (extract)'
const familyHub = 'Family-hub page on hand dominance (public health service, England)'
const severalSources = 'Agreed by several practice sources'
const tradeKnowledge = 'Therapists’ trade knowledge, from memory'

/** A hand still being chosen, speaking of the left hand, computers and tests. */
export const homeItems: readonly AdviceItem[] = [
  {
    id: 'H01',
    text: 'Put spoon, cup and crayon in front of the middle, and let the child reach with either hand.',
    because: 'The choice then stays with the child and nobody has steered it.',
    audiences: ['parent', 'teacher'],
    ageFrom: 3,
    ageTo: 7,
    caution: 'Good for every child, right-handers too.',
    grade: 'professional_consensus',
    source: familyHub,
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: ({ handPreference }) => {
      if (handPreference === 'unclear') return 'the hand is not settled yet'
      return handPreference === 'left_emerging' || handPreference === 'right_emerging'
        ? 'a hand is only just emerging'
        : null
    },
  },
  {
    id: 'H02',
    text: 'Let the child start a job with either hand and finish it with the same one. Keep a tally by activity.',
    because: 'Each job gets a whole turn of practice, and the tally shows what the child chooses.',
    audiences: ['parent', 'teacher'],
    ageFrom: 4,
    ageTo: 7,
    caution: 'No drilling. The therapist reads the tally.',
    grade: 'professional_consensus',
    source: `${familyHub}; ${tradeKnowledge}`,
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: ({ swapsWithinTask, handPreference }) =>
      swapsWithinTask === true || handPreference === 'swaps_within_task'
        ? 'the hand changes during one job'
        : null,
  },
  {
    id: 'H08',
    text: 'Speak well of the left hand, and answer doubts in the family kindly: the child’s own choice of hand stands.',
    because: 'Being pushed to use another hand upsets a child and helps no one.',
    audiences: ['parent', 'teacher'],
    ageFrom: 3,
    ageTo: 14,
    caution:
      'If a child is punished for using a hand, treat it as a safeguarding matter under your local rules.',
    grade: 'professional_consensus',
    source: `${sattler}; Marcori et al. 2019, review (abstract)`,
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: ({ concerns, askedToSwitch }) => {
      if (concerns.includes('pressure_to_switch')) return 'there is pressure to use the other hand'
      return whenTrue(askedToSwitch, 'the child has been asked to use the other hand')
    },
  },
  {
    id: 'H09',
    text: 'Leave a mix of preferred eye, foot and hand alone: it needs no training.',
    because:
      'Mixed sides are common, about four in ten left-handers sight with the right eye, and no firm link with schoolwork was found.',
    audiences: ['teacher', 'parent', 'therapist'],
    ageFrom: 4,
    ageTo: 14,
    caution: 'Say why in one line, so that nobody starts exercises.',
    grade: 'peer_reviewed',
    source: 'Bourassa et al. 1996; Ferrero, West & Vadillo 2017 (abstracts)',
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: ({ sidesCrossed }) => whenTrue(sidesCrossed, 'hand, foot and eye are not all on one side'),
  },
  {
    id: 'K01',
    text: 'Offer a computer mouse of the same shape both ways, on the left, with a long lead or none. Let the child choose the side.',
    because: 'Some left-handers like it on the left and others do well on the right.',
    audiences: ['teacher', 'parent'],
    ageFrom: 5,
    ageTo: 14,
    caution: 'It is a choice, not a rule.',
    grade: 'professional_consensus',
    source: `${sattler}; a student experiment of 1997 (abstract). Left-handed students lost nothing with the mouse on the right`,
    needsLeftWriter: true,
    leftToRightOnly: false,
    offeredFor: ({ usesMouse, goalTopics }) =>
      whenTrue(usesMouse, 'the child uses a computer mouse') ??
      (goalTopics.includes('computer') ? 'there is a computer goal' : null),
  },
  {
    id: 'K02',
    text: 'Teach typing with both hands where handwriting holds the ideas back.',
    because: 'The child’s thoughts get on the page while the handwriting catches up.',
    audiences: ['teacher', 'parent', 'therapist'],
    ageFrom: 8,
    ageTo: 14,
    caution: 'Alongside handwriting, not instead of it by default.',
    grade: 'professional_consensus',
    source: tradeKnowledge,
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: ({ goalTopics }) => {
      if (goalTopics.includes('speed')) return 'there is a goal about writing speed'
      return goalTopics.includes('pain') ? 'there is a goal about writing without pain' : null
    },
  },
  {
    id: 'E01',
    text: 'For tests: a wide desk at the left end of the row, with the question sheet on the right.',
    because: 'The arm is free, and the sheet is not hidden or moved about.',
    audiences: ['teacher'],
    ageFrom: 7,
    ageTo: 14,
    caution: 'Rehearse it in class first.',
    grade: 'common_practice',
    source: severalSources,
    needsLeftWriter: true,
    leftToRightOnly: false,
    offeredFor: ({ examWithinThreeMonths }) =>
      whenTrue(examWithinThreeMonths, 'there is a test within three months'),
  },
  {
    id: 'E02',
    text: 'Ask for extra time or a keyboard only on measured need, by the exam body’s rules and dates.',
    because: 'The exam body wants to see how the child works every day.',
    audiences: ['teacher', 'parent', 'therapist'],
    ageFrom: 10,
    ageTo: 14,
    caution: 'Being left-handed is not evidence in itself. The exam body decides.',
    grade: 'professional_consensus',
    source: `Note on exam concessions (public); ${tradeKnowledge}`,
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: ({ speedMeasuredLow, painAfter }) =>
      whenTrue(speedMeasuredLow, 'writing speed was measured as low') ??
      (painAfter !== null && painAfter >= 4 ? `writing hurts (${painAfter} out of 10)` : null),
  },
  {
    id: 'X04',
    text: 'Praise and display left-handed work as often as anyone’s.',
    because: 'Children notice whose work is on the wall.',
    audiences: ['teacher'],
    ageFrom: 4,
    ageTo: 14,
    caution: null,
    grade: 'common_practice',
    source: 'Teachers’ guidance, 1999 and 2019, and a primary school’s page',
    needsLeftWriter: true,
    leftToRightOnly: false,
    offeredFor: () => 'the child writes with the left hand',
  },
]
