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

export const children06to10: readonly DemoChild[] = [
  child({
    number: 6,
    givenName: 'Poppy',
    familyName: 'Ellacott',
    age: { years: 8, months: 9 },
    ageDays: 1,
    classKey: 'otter',
    writingHand: 'left',
    strengths:
      'Bakes with her father and reads the recipe aloud\nNever gives up on a puzzle\nWrites letters to her cousin',
    therapist: 'adaeze',
    referral: referral({
      day: -330,
      source: 'school',
      from: fromSchool('thistlebank'),
      concerns: ['handwriting', 'self_care', 'scissors_tools'],
      reason:
        'Poppy is a cheerful left-hander who avoids writing, asks for help with laces and tears the paper when cutting. At home she manages more than we see here. Could you look at what would help her in a busy classroom?',
    }),
    carers: [carer('grahamEllacott', 'father')],
    consents: [...usualConsents(-300), consent('share_school_goals', -300)],
    steps: path(
      {
        triaged: -325,
        waiting: -325,
        consented: -300,
        assessing: -290,
        formulated: -272,
        active: -268,
        review: -160,
        discharged: -40,
      },
      'adaeze',
      { discharged: 'Goals met. Family and school carry on; they know how to ask for us again.' },
    ),
  }),
  child({
    number: 7,
    givenName: 'Noor',
    familyName: 'Al-Rashwan',
    age: { years: 4, months: 2 },
    ageDays: 14,
    homeLanguages: 'Arabic, English',
    scriptDirection: 'both',
    classKey: 'robin',
    writingHand: null,
    strengths: null,
    therapist: null,
    referral: referral({
      day: -22,
      source: 'health_visitor',
      from: ['Margaret Oduya', 'Health visitor', 'm.oduya@harrowmere-health.example', '01632 960 162'],
      concerns: ['hand_preference_unclear'],
      reason:
        'Noor is four and draws with one hand and then the other. Her development is otherwise on track and both hands are strong. Her parents ask which hand they should encourage. Advice for home and nursery class would be welcome.',
    }),
    carers: [carer('hudaAlRashwan', 'mother')],
    consents: [
      consent('assessment_treatment', -16),
      consent('share_school_seating', -16),
      consent('email_link', -16),
    ],
    steps: path({ triaged: -18, waiting: -18 }, null, {
      waiting: 'Waiting. Advice on letting the hand choose has gone to home and school meanwhile.',
    }),
  }),
  child({
    number: 8,
    givenName: 'Bertie',
    familyName: 'Coombes-Hale',
    age: { years: 4, months: 6 },
    ageDays: 8,
    classKey: 'robin',
    writingHand: 'left',
    strengths: 'Loves trains and lines them up by colour\nSings all the verses of every song',
    therapist: 'tomasz',
    referral: referral({
      day: -40,
      source: 'health_visitor',
      from: ['Margaret Oduya', 'Health visitor', 'm.oduya@harrowmere-health.example', '01632 960 162'],
      concerns: ['hand_preference_unclear', 'self_care'],
      reason:
        'Bertie does everything with his left hand, and has done for as long as his mother can remember; the right hand does not join in much. She asks for help with dressing and with opening his lunch box. Please ring her: there is more to tell than fits on this form.',
      priorityReason: 'One hand for everything at four and the other hardly joins in: ring the mother today.',
    }),
    carers: [
      carer('jessicaCoombes', 'mother'),
      carerWithoutAccount('Martin Hale', 'father', { phone: '01632 960 803' }),
    ],
    consents: (['assessment_treatment', 'share_doctor'] as const).map((purpose) =>
      consent(purpose, -38, {
        method: 'phone_witnessed',
        recordedBy: 'tomasz',
        note: 'Witnessed by Pauline Osterby',
      }),
    ),
    steps: path({ triaged: -38, redirected: -37 }, 'tomasz', {
      triaged: 'Read the same day it was opened. Signs that need a doctor first.',
      redirected:
        'Referred to the child development service before any therapy. Family told by phone and in writing; they may come back to us at any time.',
    }),
  }),
  child({
    number: 9,
    givenName: 'Ayumi',
    familyName: 'Torigoe',
    age: { years: 4, months: 11 },
    ageDays: 25,
    homeLanguages: 'Japanese, English',
    classKey: 'robin',
    writingHand: 'swaps',
    strengths: null,
    therapist: null,
    referral: referral({
      day: -35,
      source: 'parent',
      from: fromParent('keikoTorigoe'),
      concerns: ['hand_preference_unclear', 'scissors_tools'],
      reason:
        'Ayumi eats with her left hand, cuts with her right and draws with either. We do not want to push her. We would like to know how to set the table and her drawing things so that she can choose.',
    }),
    carers: [carer('keikoTorigoe', 'mother')],
    consents: [
      consent('assessment_treatment', -28, { method: 'signed_in', recordedBy: null }),
      consent('email_link', -28, { method: 'signed_in', recordedBy: null }),
    ],
    steps: path({ triaged: -30, waiting: -30 }, null),
  }),
  child({
    number: 10,
    givenName: 'Kofi',
    familyName: 'Adjarey',
    age: { years: 5, months: 1 },
    ageDays: 17,
    homeLanguages: 'English, Twi',
    classKey: 'robin',
    writingHand: 'swaps',
    strengths:
      'Dances to any music and teaches the steps to others\nBuilds tall towers and explains how they stand',
    therapist: 'rohan',
    referral: referral({
      day: -75,
      source: 'school',
      from: fromSchool('larkwater'),
      concerns: ['hand_preference_unclear', 'handwriting'],
      reason:
        'Kofi starts a drawing with one hand and finishes it with the other, often changing at the middle of the page. He seems happy either way. We start letters soon and would like to know how to go about it.',
    }),
    carers: [carer('kwameAdjarey', 'father')],
    consents: [...usualConsents(-40), consent('share_school_observation', -40)],
    steps: path({ triaged: -71, waiting: -71, consented: -40, assessing: -33 }, 'rohan'),
    nextReviewDay: 30,
  }),
]
