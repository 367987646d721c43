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

export const children21to25: readonly DemoChild[] = [
  child({
    number: 21,
    givenName: 'Rafael',
    familyName: 'Montoya-Birch',
    preferredName: 'Rafa',
    age: { years: 7, months: 0 },
    ageDays: 7,
    homeLanguages: 'English, Spanish',
    classKey: 'otter',
    writingHand: 'left',
    strengths:
      'Football mad, and fair to both teams\nTells what happened in a match from start to end\nBrave about trying new things',
    therapist: 'rohan',
    referral: referral({
      day: -125,
      source: 'parent',
      from: fromParent('carmenMontoya'),
      concerns: ['handwriting', 'self_care'],
      reason:
        'Rafa is left-handed. His letters are hard to read even for him, and laces and buttons take a long time in the morning. We would like help with both so that school days start better.',
    }),
    carers: [
      carer('carmenMontoya', 'mother'),
      carerWithoutAccount('Joseph Birch', 'father', { phone: '01632 960 808' }),
    ],
    consents: usualConsents(-98),
    steps: path(
      { triaged: -121, waiting: -121, consented: -98, assessing: -90, formulated: -78, active: -74 },
      'rohan',
    ),
    nextReviewDay: 10,
  }),
  child({
    number: 22,
    givenName: 'Leilani',
    familyName: 'Kapaona',
    age: { years: 7, months: 3 },
    ageDays: 15,
    homeLanguages: 'English, Hawaiian',
    classKey: 'otter',
    writingHand: 'left',
    strengths:
      'Dances hula and keeps perfect time\nSees how a room could be arranged better\nWrites neat labels',
    therapist: 'mairi',
    referral: referral({
      day: -200,
      source: 'school',
      from: fromSchool('thistlebank'),
      concerns: ['seating', 'handwriting'],
      reason:
        'Leilani is small for her age and left-handed. Her feet do not reach the floor and she leans on her arm to write, so that her letters wander. We can change the furniture if we know how.',
    }),
    carers: [carer('noelaniKapaona', 'mother')],
    consents: usualConsents(-172),
    steps: path(
      {
        triaged: -195,
        waiting: -195,
        consented: -172,
        assessing: -160,
        formulated: -148,
        active: -142,
        review: -60,
      },
      'mairi',
    ),
    nextReviewDay: 5,
  }),
  child({
    number: 23,
    givenName: 'Hamza',
    familyName: 'Siddiq-Rowe',
    age: { years: 7, months: 6 },
    ageDays: 21,
    homeLanguages: 'English, Urdu',
    classKey: 'otter',
    writingHand: 'left',
    strengths:
      'Plays chess and thinks ahead\nDraws maps of every place he visits\nSettles quarrels between friends',
    therapist: 'adaeze',
    referral: referral({
      day: -135,
      source: 'family_doctor',
      from: ['Dr Owen Mallory', 'Family doctor', 'office@millpond-practice.example', '01632 960 163'],
      concerns: ['handwriting', 'speed'],
      reason:
        'Seven-year-old left-handed boy whose parents live apart. Both are concerned about slow writing. Please send letters to each parent separately: a court order keeps the mother’s address from the father.',
    }),
    carers: [
      carer('nadiaSiddiq', 'mother', { courtOrder: true }),
      carer('danielRowe', 'father', { courtOrder: true }),
    ],
    consents: [...usualConsents(-104), consent('email_link', -102, { carer: 1 })],
    steps: path(
      { triaged: -130, waiting: -130, consented: -104, assessing: -96, formulated: -84, active: -80 },
      'adaeze',
    ),
    nextReviewDay: 14,
  }),
  child({
    number: 24,
    givenName: 'Ottilie',
    familyName: 'Brandreth',
    age: { years: 7, months: 9 },
    ageDays: 4,
    lookedAfter: true,
    classKey: 'otter',
    writingHand: 'left',
    strengths:
      'Cares for two rabbits and knows all about them\nLearns songs after hearing them once\nIs proud of her tidy drawer',
    therapist: 'tomasz',
    referral: referral({
      day: -145,
      source: 'other_therapist',
      from: [
        'Bethan Rusk',
        'Speech and language therapist',
        'bethan.rusk@harrowmere-health.example',
        '01632 960 164',
      ],
      concerns: ['handwriting', 'scissors_tools'],
      reason:
        'Ottilie lives with a foster carer. She is left-handed, has changed schools three times and missed most of the teaching of letter shapes. She would like to write to her brother by herself.',
    }),
    carers: [
      carer('judithAmory', 'foster_carer', { parentalResponsibility: 'no' }),
      carerWithoutAccount('Harrowmere Council, children’s team', 'local_authority', {
        email: 'childrens.team@harrowmere-council.example',
        phone: '01632 960 165',
      }),
    ],
    consents: [
      ...(['assessment_treatment', 'store_work_samples', 'share_school_seating'] as const).map((purpose) =>
        consent(purpose, -118, {
          carer: 1,
          basis: 'court_order',
          note: 'The council holds parental responsibility under a care order',
        }),
      ),
      consent('email_link', -118, {
        basis: 'other',
        note: 'Foster carer, with the council’s agreement in writing',
      }),
    ],
    steps: path(
      { triaged: -140, waiting: -140, consented: -118, assessing: -105, formulated: -90, active: -84 },
      'tomasz',
    ),
    nextReviewDay: 8,
  }),
  child({
    number: 25,
    givenName: 'Dilan',
    familyName: 'Yavaş',
    age: { years: 7, months: 11 },
    ageDays: 10,
    homeLanguages: 'Turkish, English',
    classKey: 'otter',
    writingHand: 'left',
    strengths: null,
    therapist: null,
    referral: referral({
      day: -137,
      source: 'school',
      from: fromSchool('thistlebank'),
      concerns: ['speed', 'handwriting'],
      reason:
        'Dilan is left-handed and rarely finishes written work in the lesson, although he knows the answers when asked. He rubs out a lot. His parents and we would like to know how to help him keep pace.',
    }),
    carers: [carer('sevgiYavas', 'mother')],
    consents: [
      consent('assessment_treatment', -90),
      consent('share_school_seating', -90),
      consent('share_school_observation', -90),
      consent('email_link', -90),
    ],
    steps: path({ triaged: -128, waiting: -128 }, null),
  }),
]
