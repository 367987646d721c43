import {
  carer,
  carerWithoutAccount,
  child,
  consent,
  fromParent,
  fromSchool,
  path,
  referral,
  usualConsents,
} from './childParts.ts'
import type { DemoChild } from './demoTypes.ts'

export const children01to05: readonly DemoChild[] = [
  child({
    number: 1,
    givenName: 'Mateo',
    familyName: 'Quispe-Arnold',
    age: { years: 8, months: 7 },
    ageDays: 11,
    homeLanguages: 'English, Spanish',
    classKey: 'heron',
    writingHand: 'left',
    strengths:
      'Draws comics with many small panels and gives every figure a voice\nExplains his ideas well and helps others with spelling\nSteady and patient with paper models',
    therapist: 'adaeze',
    referral: referral({
      day: -150,
      source: 'school',
      from: fromSchool('thistlebank'),
      concerns: ['handwriting', 'seating'],
      reason:
        'Mateo has plenty to say and reads well. His pages smear as he writes with the left hand, and he and his neighbour bump elbows at the double desk. He writes much less than he can tell us. We would like to know what we should change in class.',
    }),
    carers: [
      carer('luciaQuispe', 'mother'),
      carer('tomArnold', 'father', { address: carer('luciaQuispe', 'mother').address }),
    ],
    consents: [
      ...usualConsents(-128),
      consent('share_school_goals', -128),
      consent('email_link', -128, { carer: 1 }),
    ],
    steps: path(
      { triaged: -146, waiting: -146, consented: -128, assessing: -124, formulated: -110, active: -106 },
      'adaeze',
    ),
    nextReviewDay: 12,
  }),
  child({
    number: 2,
    givenName: 'Anouk',
    familyName: 'Verhaeghen',
    age: { years: 8, months: 11 },
    ageDays: 3,
    homeLanguages: 'English, Dutch',
    classKey: 'heron',
    writingHand: 'left',
    strengths:
      'Writes long stories that others ask to hear\nPlays the recorder and reads music\nHer letters are clear and even',
    therapist: 'adaeze',
    referral: referral({
      day: -120,
      source: 'parent',
      from: fromParent('saskiaVerhaeghen'),
      concerns: ['handwriting', 'other'],
      reason:
        'Our daughter writes with her hand above the line. It looks uncomfortable to us and a relative said it must be changed before it is too late. She says it does not hurt. We would like to know whether anything should be done.',
    }),
    carers: [carer('saskiaVerhaeghen', 'mother')],
    consents: usualConsents(-100),
    steps: path(
      { triaged: -116, waiting: -116, consented: -100, assessing: -97, formulated: -88, active: -85 },
      'adaeze',
      {
        active: 'Two sessions on how writing works, then a check.',
      },
    ),
    nextReviewDay: 20,
  }),
  child({
    number: 3,
    givenName: 'Idris',
    familyName: 'Bello-Marsh',
    age: { years: 8, months: 5 },
    ageDays: 19,
    homeLanguages: 'English, Hausa',
    classKey: 'heron',
    writingHand: 'left',
    strengths:
      'Knows everything about bridges and builds them from straws\nKind to younger children\nKeeps trying when something is hard',
    therapist: 'rohan',
    referral: referral({
      day: -131,
      source: 'family_doctor',
      from: ['Dr Helen Whitcombe', 'Family doctor', 'reception@weirstreet-surgery.example', '01632 960 161'],
      concerns: ['handwriting', 'pain_fatigue'],
      reason:
        'Eight-year-old left-handed boy who says that his hand hurts after about ten minutes of writing. Examination of the arm was unremarkable and there is no weakness. Please advise on writing posture and how much he should be asked to write.',
    }),
    carers: [
      carer('aminaBello', 'mother'),
      carerWithoutAccount('Stephen Marsh', 'father', { phone: '01632 960 801' }),
    ],
    consents: [...usualConsents(-104), consent('share_doctor', -104)],
    steps: path(
      { triaged: -127, waiting: -127, consented: -104, assessing: -98, formulated: -84, active: -80 },
      'rohan',
    ),
    nextReviewDay: 9,
  }),
  child({
    number: 4,
    givenName: 'Soraya',
    familyName: 'Haidari',
    age: { years: 8, months: 2 },
    ageDays: 6,
    homeLanguages: 'Dari, English',
    interpreterLanguage: 'Dari',
    scriptDirection: 'both',
    classKey: 'otter',
    writingHand: 'left',
    strengths:
      'Writes in two scripts and switches between them with ease\nSews small figures from felt\nRemembers poems by heart',
    therapist: 'mairi',
    referral: referral({
      day: -160,
      source: 'school',
      from: fromSchool('thistlebank'),
      concerns: ['handwriting', 'speed'],
      reason:
        'Soraya joined us a year ago and writes with her left hand. She writes Dari at home from right to left and English here. English copying is slow and she tires. We are not sure whether our usual advice for left-handers fits her.',
    }),
    carers: [
      carer('faridHaidari', 'father'),
      carerWithoutAccount('Laleh Haidari', 'mother', { phone: '01632 960 802' }),
    ],
    consents: usualConsents(-138, { note: 'Consent form in Dari, gone through with an interpreter' }),
    steps: path(
      { triaged: -154, waiting: -154, consented: -138, assessing: -125, formulated: -105, active: -100 },
      'mairi',
    ),
    nextReviewDay: 16,
  }),
  child({
    number: 5,
    givenName: 'Tane',
    familyName: 'Whetuira',
    age: { years: 8, months: 4 },
    ageDays: 22,
    homeLanguages: 'English, Māori',
    classKey: 'otter',
    writingHand: 'left',
    strengths:
      'Strong swimmer who helps in the beginners’ group\nCarves soap figures with great care\nTells jokes that make the whole class laugh',
    therapist: 'tomasz',
    referral: referral({
      day: -290,
      source: 'parent',
      from: fromParent('arohaWhetuira'),
      concerns: ['handwriting', 'scissors_tools'],
      reason:
        'Tane finds writing and cutting slow and comes home saying he is the last to finish. He is left-handed like his grandfather. We would like ideas that make it easier for him at school and at home.',
    }),
    carers: [carer('arohaWhetuira', 'mother')],
    consents: usualConsents(-262),
    steps: path(
      {
        triaged: -284,
        waiting: -284,
        consented: -262,
        assessing: -250,
        formulated: -230,
        active: -225,
        review: -119,
      },
      'tomasz',
    ),
    nextReviewDay: -35,
  }),
]
