import { carer, child, consent, fromParent, fromSchool, path, referral, usualConsents } from './childParts.ts'
import type { DemoChild } from './demoTypes.ts'

export const children26to30: readonly DemoChild[] = [
  child({
    number: 26,
    givenName: 'Esther',
    familyName: 'Makori-Lund',
    age: { years: 9, months: 1 },
    ageDays: 26,
    homeLanguages: 'English, Swahili',
    classKey: 'badger',
    writingHand: 'left',
    strengths:
      'Speaks well in front of the whole school\nKnits, and taught two friends\nPlans her work before she starts',
    therapist: 'rohan',
    referral: referral({
      day: -118,
      source: 'school',
      from: fromSchool('thistlebank'),
      concerns: ['handwriting', 'speed'],
      reason:
        'Esther writes with her left hand and her work smears across the page. She has begun to write as little as she can. Her ideas are far ahead of what reaches the paper.',
    }),
    carers: [carer('graceMakori', 'mother')],
    consents: [...usualConsents(-92), consent('email_attachment', -92)],
    steps: path(
      { triaged: -114, waiting: -114, consented: -92, assessing: -84, formulated: -72, active: -68 },
      'rohan',
    ),
    nextReviewDay: 21,
  }),
  child({
    number: 27,
    givenName: 'Finlay',
    familyName: 'Garroway',
    age: { years: 9, months: 4 },
    ageDays: 0,
    classKey: 'badger',
    writingHand: 'left',
    strengths:
      'Fishes with his uncle and ties his own knots\nRemembers what he has read\nCheerful even with his arm in plaster',
    therapist: 'adaeze',
    referral: referral({
      day: -240,
      source: 'parent',
      from: fromParent('kirstyGarroway'),
      concerns: ['handwriting'],
      reason:
        'Finlay is left-handed and his writing has got smaller and smaller, so that even he cannot read it back. He is bright and it is starting to get in the way. We would be glad of some help.',
    }),
    carers: [carer('kirstyGarroway', 'mother')],
    consents: usualConsents(-214),
    steps: path(
      {
        triaged: -235,
        waiting: -235,
        consented: -214,
        assessing: -205,
        formulated: -190,
        active: -186,
        review: -48,
      },
      'adaeze',
      {
        review:
          'Left arm broken and in plaster: block stopped early, medical review, then a plan for the return.',
      },
    ),
    nextReviewDay: 13,
  }),
  child({
    number: 28,
    givenName: 'Inés',
    familyName: 'Salvatierra',
    age: { years: 9, months: 7 },
    ageDays: 19,
    homeLanguages: 'Spanish, English',
    classKey: 'badger',
    writingHand: 'left',
    strengths: 'Plays the drums\nKind and loyal friend\nCooks paella with her father',
    therapist: 'mairi',
    referral: referral({
      day: -390,
      source: 'school',
      from: fromSchool('thistlebank'),
      concerns: ['handwriting', 'self_care'],
      reason:
        'Inés is left-handed. Writing, cutlery and laces all take her longer than her friends and she has started to mind. She works very hard at everything we suggest.',
    }),
    carers: [carer('andresSalvatierra', 'father')],
    consents: usualConsents(-358),
    steps: path(
      {
        triaged: -384,
        waiting: -384,
        consented: -358,
        assessing: -345,
        formulated: -328,
        active: -322,
        review: -220,
        discharged: -130,
      },
      'mairi',
      {
        discharged:
          'Gains have levelled off and one goal was not reached. Plan for home and school given, with when to ask for us again.',
      },
    ),
  }),
  child({
    number: 29,
    givenName: 'Viktor',
    familyName: 'Danailov',
    age: { years: 9, months: 10 },
    ageDays: 23,
    homeLanguages: 'English, Bulgarian',
    classKey: 'badger',
    writingHand: 'left',
    strengths: 'Takes bicycles apart and puts them together again\nGood with numbers\nGentle with animals',
    therapist: 'tomasz',
    referral: referral({
      day: -165,
      source: 'school',
      from: fromSchool('thistlebank'),
      concerns: ['handwriting', 'scissors_tools'],
      reason:
        'Viktor uses his left hand and avoids written work, although he can explain everything aloud. Rulers and compasses are a struggle. He has been absent a good deal this year.',
    }),
    carers: [carer('elenaDanailova', 'mother')],
    consents: usualConsents(-140),
    steps: path(
      { triaged: -160, waiting: -160, consented: -140, assessing: -128, formulated: -112, active: -106 },
      'tomasz',
    ),
    nextReviewDay: 6,
  }),
  child({
    number: 30,
    givenName: 'Tui',
    familyName: 'Parangi',
    age: { years: 10, months: 0 },
    ageDays: 5,
    homeLanguages: 'English, Māori',
    classKey: 'badger',
    writingHand: 'left',
    strengths: null,
    therapist: null,
    referral: referral({
      day: -30,
      source: 'school',
      from: fromSchool('thistlebank'),
      concerns: ['speed', 'seating'],
      reason:
        'Tui is left-handed and sits the transfer tests in about nine weeks. In practice papers she runs out of time and the question sheet lies under her arm. We would like to know how to set up the room for her.',
      priorityReason: 'Transfer tests in nine weeks: advice on the test room is no use after them.',
    }),
    carers: [carer('hemiParangi', 'father')],
    consents: [consent('share_school_seating', -26), consent('email_link', -26)],
    steps: path({ triaged: -28, waiting: -28 }, null, {
      waiting: 'Priority place. Advice for the test room sent to school at once.',
    }),
  }),
]
