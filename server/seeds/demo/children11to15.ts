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

const twins = (name: string, other: string): DemoReferral =>
  referral({
    day: -90,
    source: 'parent',
    from: fromParent('majaLindqvist'),
    concerns: ['hand_preference_unclear', 'seating'],
    reason: `Our twins start letters this year. ${name} does most things with one hand and ${other} with the other, and they sit side by side at every table. We would like to know that each of them may go their own way, and how to seat them.`,
  })

const twinCarers = [
  carer('majaLindqvist', 'mother'),
  // Both parents read the same inbox; only one of them can have an account with it.
  carerWithoutAccount('Oliver Shaw', 'father', {
    email: 'lindqvist-shaw.family@harrowmere.example',
    phone: '01632 960 804',
  }),
]

export const children11to15: readonly DemoChild[] = [
  child({
    number: 11,
    givenName: 'Freya',
    familyName: 'Lindqvist-Shaw',
    age: { years: 5, months: 6 },
    ageDays: 9,
    homeLanguages: 'English, Swedish',
    classKey: 'wren',
    writingHand: 'left',
    strengths: 'Paints every day and mixes her own colours\nClimbs anything that can be climbed',
    therapist: 'mairi',
    referral: twins('Freya', 'Axel'),
    carers: twinCarers,
    consents: usualConsents(-50),
    steps: path({ triaged: -85, waiting: -85, consented: -50, assessing: -42 }, 'mairi'),
    nextReviewDay: 24,
  }),
  child({
    number: 12,
    givenName: 'Axel',
    familyName: 'Lindqvist-Shaw',
    age: { years: 5, months: 6 },
    ageDays: 9,
    homeLanguages: 'English, Swedish',
    classKey: 'wren',
    writingHand: 'right',
    strengths: 'Knows the names of more than thirty dinosaurs\nShares his things without being asked',
    therapist: 'mairi',
    referral: twins('Axel', 'Freya'),
    carers: twinCarers,
    consents: usualConsents(-50),
    steps: path({ triaged: -85, waiting: -85, consented: -50, assessing: -42 }, 'mairi'),
    nextReviewDay: 24,
  }),
  child({
    number: 13,
    givenName: 'Amara',
    familyName: 'Diallo-Finn',
    age: { years: 5, months: 9 },
    ageDays: 20,
    homeLanguages: 'English, French',
    classKey: 'wren',
    writingHand: 'left',
    strengths:
      'Tells stories with puppets she makes herself\nLooks after the class plants\nWrites her name on everything',
    therapist: 'adaeze',
    referral: referral({
      day: -110,
      source: 'school',
      from: fromSchool('larkwater'),
      concerns: ['handwriting', 'pressure_to_switch'],
      reason:
        'Amara is keen to write and uses her left hand for nearly everything. At the gate her grandmother often asks us to give her the pencil in the right hand. Mum is happy for her to use the left. Amara has begun to look around before she picks up a pencil.',
    }),
    carers: [
      carer('fatouDiallo', 'mother'),
      carerWithoutAccount('Bintou Diallo', 'grandparent', {
        parentalResponsibility: 'no',
        phone: '01632 960 805',
      }),
    ],
    consents: usualConsents(-84),
    steps: path(
      { triaged: -106, waiting: -106, consented: -84, assessing: -80, formulated: -70, active: -66 },
      'adaeze',
    ),
    nextReviewDay: 18,
  }),
  child({
    number: 14,
    givenName: 'Jakub',
    familyName: 'Sroka',
    age: { years: 5, months: 3 },
    ageDays: 5,
    homeLanguages: 'Polish, English',
    interpreterLanguage: 'Polish',
    classKey: 'wren',
    writingHand: 'left',
    strengths: null,
    therapist: null,
    referral: referral({
      day: -61,
      source: 'school',
      from: fromSchool('larkwater'),
      concerns: ['handwriting', 'scissors_tools'],
      reason:
        'Jakub uses his left hand and presses so hard that the paper tears. He gives up on cutting. His parents speak Polish and would like everything in writing in Polish; an interpreter is needed for visits.',
    }),
    carers: [
      carer('piotrSroka', 'father'),
      carerWithoutAccount('Ewa Sroka', 'mother', { phone: '01632 960 806' }),
    ],
    consents: usualConsents(-20, { note: 'Sent in Polish; returned signed by the father' }),
    steps: path({ triaged: -56, waiting: -56 }, null),
  }),
  child({
    number: 15,
    givenName: 'Priya',
    familyName: 'Raghunath',
    age: { years: 6, months: 2 },
    ageDays: 13,
    homeLanguages: 'English, Tamil',
    classKey: 'wren',
    writingHand: 'right',
    strengths:
      'Sings and remembers long songs in two languages\nCareful with small things\nAsks good questions',
    therapist: 'tomasz',
    referral: referral({
      day: -140,
      source: 'parent',
      from: fromParent('meenaRaghunath'),
      concerns: ['hand_preference_unclear', 'pressure_to_switch'],
      reason:
        'When Priya was five, a helper at her old school asked her to use her right hand for writing. In class she writes with the right but throws, draws at home and opens jars with the left. She says she does not know which hand is hers. We would like to understand.',
    }),
    carers: [carer('meenaRaghunath', 'mother')],
    consents: [...usualConsents(-112), consent('share_school_observation', -112)],
    steps: path(
      { triaged: -135, waiting: -135, consented: -112, assessing: -104, formulated: -86, active: -80 },
      'tomasz',
      {
        formulated: 'Possibly asked away from the left hand. Confidence was low at first and is medium now.',
      },
    ),
    nextReviewDay: 25,
  }),
]
