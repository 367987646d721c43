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
import type { DemoChild, DemoReferral } from './demoTypes.ts'

export const children16to20: readonly DemoChild[] = [
  child({
    number: 16,
    givenName: 'Callum',
    familyName: 'Strathearn',
    age: { years: 6, months: 8 },
    ageDays: 2,
    classKey: 'finch',
    writingHand: 'left',
    strengths: 'Runs faster than anybody in his class\nBuilds dens and draws plans for them',
    therapist: 'rohan',
    referral: referral({
      day: -155,
      source: 'school',
      from: fromSchool('larkwater'),
      concerns: ['handwriting', 'seating'],
      reason:
        'Callum writes with his left hand, often standing up or half off the chair. He sits on the right of a right-handed friend and they knock each other. His letters are large and float off the line.',
    }),
    carers: [carer('islaStrathearn', 'mother')],
    consents: usualConsents(-130, {
      withdrawn: {
        day: -9,
        time: '15:40',
        reason: 'The family has decided to stop for now. Withdrawn by phone, for all purposes.',
        by: 'rohan',
      },
    }),
    steps: path(
      {
        triaged: -150,
        waiting: -150,
        consented: -130,
        assessing: -118,
        formulated: -104,
        active: -98,
        consent_withdrawn: -9,
      },
      'rohan',
      {
        consent_withdrawn:
          'Mother withdrew consent in the middle of the block. Thanked her; the way back stays open.',
      },
    ),
  }),
  child({
    number: 17,
    givenName: 'Mei-Lin',
    familyName: 'Tsao',
    age: { years: 6, months: 5 },
    ageDays: 16,
    homeLanguages: 'Cantonese, English',
    classKey: 'finch',
    writingHand: 'left',
    strengths:
      'Folds paper animals from memory\nPlays the piano with her grandmother\nNotices small changes in pictures',
    therapist: 'mairi',
    referral: referral({
      day: -100,
      source: 'school',
      from: fromSchool('larkwater'),
      concerns: ['handwriting'],
      reason:
        'Mei-Lin is left-handed and writes some letters and now and then whole words turned round, starting at the right edge of the page. She reads well. We know this can be usual at her age and would like advice on how to teach the shapes.',
    }),
    carers: [
      carer('wenTsao', 'mother'),
      carerWithoutAccount('Shu-Fen Tsao', 'grandparent', {
        parentalResponsibility: 'no',
        phone: '01632 960 807',
      }),
    ],
    consents: usualConsents(-78, {
      method: 'phone_witnessed',
      recordedBy: 'mairi',
      note: 'Mother at work; grandmother brings Mei-Lin. Given by phone, witnessed by Pauline Osterby.',
    }),
    steps: path(
      { triaged: -95, waiting: -95, consented: -78, assessing: -70, formulated: -60, active: -56 },
      'mairi',
    ),
    nextReviewDay: 28,
  }),
  child({
    number: 18,
    givenName: 'Oluwaseun',
    familyName: 'Bright',
    preferredName: 'Seun',
    age: { years: 6, months: 10 },
    ageDays: 24,
    homeLanguages: 'English, Yoruba',
    classKey: 'finch',
    writingHand: 'left',
    strengths:
      'Makes birthday cards for the whole family\nGood at finding out how things work\nWaits for others to finish',
    therapist: 'adaeze',
    referral: referral({
      day: -98,
      source: 'school',
      from: fromSchool('larkwater'),
      concerns: ['scissors_tools'],
      reason:
        'Seun is left-handed and loves making things, but the class scissors fold the paper and his edges come out jagged. He has started to leave the cutting to others. Which scissors and which way of cutting would suit him?',
    }),
    carers: [carer('folakeBright', 'mother')],
    consents: usualConsents(-74),
    steps: path(
      { triaged: -94, waiting: -94, consented: -74, assessing: -66, formulated: -57, active: -53 },
      'adaeze',
    ),
    nextReviewDay: 31,
  }),
  child({
    number: 19,
    givenName: 'Gethin',
    familyName: 'Prosser-Lee',
    age: { years: 6, months: 0 },
    ageDays: 12,
    homeLanguages: 'English, Welsh',
    classKey: 'wren',
    writingHand: 'left',
    strengths: null,
    therapist: null,
    referral: referral({
      day: -18,
      source: 'school',
      from: fromSchool('larkwater'),
      concerns: ['handwriting'],
      reason:
        'Gethin is left-handed and finds forming letters takes a lot of effort. He covers what he has written and loses his place on the line. We would like advice on paper, pencil and where he should sit.',
    }),
    carers: [carer('rhodriProsser', 'father')],
    consents: [],
    steps: path({ triaged: -14, waiting: -14 }, null),
  }),
  child({
    number: 20,
    givenName: 'Zofia',
    familyName: 'Halbersztadt',
    age: { years: 6, months: 11 },
    ageDays: 18,
    homeLanguages: 'English, Polish',
    classKey: 'finch',
    writingHand: 'left',
    strengths: 'Uses each hand for what it does best and can say which\nA strong reader\nGood at ball games',
    therapist: 'tomasz',
    referral: referral({
      day: -210,
      source: 'school',
      from: fromSchool('larkwater'),
      concerns: ['hand_preference_unclear'],
      reason:
        'Zofia writes with her left hand in school but we see her cut, throw and use the computer with the right. Her mother describes it differently. She is getting on well; we would like to know whether this needs any help.',
    }),
    carers: [carer('hannaHalbersztadt', 'mother')],
    consents: [...usualConsents(-180), consent('share_school_observation', -180)],
    steps: path(
      { triaged: -205, waiting: -205, consented: -180, assessing: -170, formulated: -150, discharged: -120 },
      'tomasz',
      {
        formulated:
          'Uses different hands for different jobs, and always the same one for each. Advice is enough.',
        discharged:
          'Advice given to home and school. Nothing more is needed; they know how to ask for us again.',
      },
    ),
  }),
]

/** The second letter about Gethin, from his father: it waits to be joined to the first. */
export const gethinAgain: DemoReferral = referral({
  day: -11,
  source: 'parent',
  from: fromParent('rhodriProsser'),
  concerns: ['handwriting', 'speed'],
  reason:
    'Our son Gethin is left-handed and does not like writing. His teacher told us she has written to you as well. He is quick at everything else and we would like to help him enjoy it more.',
})
