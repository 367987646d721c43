import { measure, whenTrue, type AdviceItem } from '../adviceItem.ts'

const districtTherapists = 'School-district therapists’ strategies for left-handed pupils, 2010'
const teachers = 'Teachers’ guidance, 1999 and 2019, and a primary school’s page'
const tradeKnowledge = 'Therapists’ trade knowledge, from memory'

/** Teaching letters, copying, practice, speed and comfort. */
export const writingLessonItems: readonly AdviceItem[] = [
  {
    id: 'W12',
    text: 'Put a green start mark at the left margin, and let it fade within a few weeks.',
    because: 'It shows at a glance where the line begins, without a word being said.',
    audiences: ['teacher', 'parent', 'child'],
    ageFrom: 4,
    ageTo: 7,
    caution: 'Take it away once it is not needed.',
    grade: 'common_practice',
    source: teachers,
    needsLeftWriter: false,
    leftToRightOnly: true,
    offeredFor: ({ startsAtRight, mirrorWords }) =>
      whenTrue(startsAtRight, 'writing starts at the right') ??
      whenTrue(mirrorWords, 'whole words come out mirrored'),
  },
  {
    id: 'W13',
    text: 'Teach the shape of a mirrored letter calmly, one letter at a time.',
    because: 'At 5 and 6 turned letters are usual whichever hand a child writes with.',
    audiences: ['teacher', 'parent'],
    ageFrom: 4,
    ageTo: 7,
    caution: 'If they are still frequent after 7½, tell the therapist.',
    grade: 'peer_reviewed',
    source:
      'Study of mirror writing at 5 to 6, Laterality 2015 (author’s summary). The age is from trade knowledge',
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: ({ reversals }) => {
      if (reversals === null || reversals < 1) return null
      return reversals === 1
        ? 'one letter was turned round in a sample'
        : `${reversals} letters were turned round in a sample`
    },
  },
  {
    id: 'W14',
    text: 'Keep the same letter shapes for everyone. The cross-strokes of t, f and H may run from right to left.',
    because: 'A left hand pulls a cross-stroke more easily than it pushes one.',
    audiences: ['teacher', 'child'],
    ageFrom: 4,
    ageTo: 8,
    caution: 'E, F and L usually run left to right so that letters join.',
    grade: 'professional_consensus',
    source: `${districtTherapists}; Vaid et al. 2002 and a children’s line-drawing study, 2000 (abstracts). Studies of drawn lines do not all agree`,
    needsLeftWriter: true,
    leftToRightOnly: true,
    offeredFor: ({ crossStrokeTrouble }) => whenTrue(crossStrokeTrouble, 'cross-strokes take effort'),
  },
  {
    id: 'W15',
    text: 'Show new letters with your own left hand, or facing the child, and say the path aloud.',
    because: 'The child can copy what is seen without turning it round first.',
    audiences: ['teacher', 'parent'],
    ageFrom: 4,
    ageTo: 8,
    caution: 'Say the path aloud as well.',
    grade: 'common_practice',
    source: 'Agreed by several practice sources',
    needsLeftWriter: true,
    leftToRightOnly: false,
    offeredFor: ({ writingStage }) =>
      writingStage === 'learning_letters' ? 'the child is learning new letter shapes' : null,
  },
  {
    id: 'W16',
    text: 'Make strokes big first, on an easel or a wall, before they get small on paper.',
    because: 'Big movements from the shoulder come before small ones of the fingers.',
    audiences: ['teacher', 'parent'],
    ageFrom: 4,
    ageTo: 6,
    caution: 'Stop when the arm is tired.',
    grade: 'common_practice',
    source: tradeKnowledge,
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: ({ writingStage }) =>
      writingStage === 'first_strokes' ? 'the child is making first strokes' : null,
  },
  {
    id: 'W17',
    text: 'Put what is to be copied on the child’s right, or above the page.',
    because: 'The writing hand and arm do not cover it there.',
    audiences: ['teacher', 'parent'],
    ageFrom: 6,
    ageTo: 14,
    caution: 'Above the page works too.',
    grade: 'professional_consensus',
    source: districtTherapists,
    needsLeftWriter: true,
    leftToRightOnly: true,
    offeredFor: ({ copyingSlow }) => whenTrue(copyingSlow, 'copying takes long'),
  },
  {
    id: 'W18',
    text: 'Set out worksheets with the model word and the tick boxes at the right or above, clear of the hand.',
    because: 'A left hand hides what is printed at the left of a line.',
    audiences: ['teacher'],
    ageFrom: 5,
    ageTo: 14,
    caution: 'At the right or above.',
    grade: 'common_practice',
    source: 'Teachers’ note on tick boxes in tests',
    needsLeftWriter: true,
    leftToRightOnly: true,
    offeredFor: ({ handCoversModel }) => whenTrue(handCoversModel, 'the hand covers the model word'),
  },
  {
    id: 'W19',
    text: 'Practise real writing, little and often, rather than hand exercises alone.',
    because: 'Writing gets better by writing.',
    audiences: ['teacher', 'parent', 'therapist'],
    ageFrom: 6,
    ageTo: 12,
    caution: 'Keep a log of the sessions.',
    grade: 'professional_consensus',
    source: `${tradeKnowledge}. A review of 2011 was found; its conclusion has not been read`,
    needsLeftWriter: false,
    leftToRightOnly: false,
    // From a pain of 4 a therapist looks first: see W21.
    offeredFor: ({ goalTopics, painAfter }) =>
      goalTopics.includes('handwriting') && (painAfter === null || painAfter < 4)
        ? 'there is a handwriting goal'
        : null,
  },
  {
    id: 'W20',
    text: 'Measure the speed before calling it slow, each time with the same task and the same kind of letters.',
    because: 'Studies do not agree that left-handed children write more slowly.',
    audiences: ['teacher', 'therapist'],
    ageFrom: 7,
    ageTo: 14,
    caution: 'Compare only the same task and script.',
    grade: 'peer_reviewed',
    source: 'Graham et al. 1998; Australian and Irish speed studies (abstracts), which disagree',
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: ({ concerns, lettersPerMinute }) => {
      if (!concerns.includes('speed')) return null
      if (lettersPerMinute === null) return 'speed is a concern and has not been measured'
      return `speed is a concern (last measured at ${Math.round(lettersPerMinute)} letters a minute)`
    },
  },
  {
    id: 'W21',
    text: 'When writing hurts, plan pauses and another way to answer: speaking, typing, fewer words.',
    because: 'A hand that hurts cannot show what the child knows.',
    audiences: ['teacher', 'parent', 'child'],
    ageFrom: 6,
    ageTo: 14,
    caution:
      'At 4 or more out of 10 the therapist looks before there is more practice. New or lasting pain: ask a doctor.',
    grade: 'professional_consensus',
    source: tradeKnowledge,
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: ({ painAfter }) =>
      painAfter !== null && painAfter >= 3 ? `writing hurts (${measure(painAfter, 'out of 10')})` : null,
  },
  {
    id: 'W22',
    text: 'For a script that runs right to left the left hand pulls: set the page up with the family, as they do it.',
    because: 'What helps with English letters does not carry over to a script that runs the other way.',
    audiences: ['teacher', 'parent', 'therapist'],
    ageFrom: 5,
    ageTo: 14,
    caution: 'Do not copy the left-to-right rules across.',
    grade: 'common_practice',
    source: tradeKnowledge,
    needsLeftWriter: true,
    leftToRightOnly: false,
    offeredFor: ({ scriptDirection }) => {
      if (scriptDirection === 'both') return 'the child writes in both directions'
      return scriptDirection === 'rtl' ? 'the child’s script runs right to left' : null
    },
  },
]
