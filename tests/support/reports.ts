import type { ConclusionContent } from '../../shared/conclusions.ts'
import type { LateralLineRow } from '../../shared/lateralLine.ts'
import type { ReportForPrint } from '../../server/pdf/assessmentReport.ts'

/** A row of the lateral line: the ten activities, answered by a parent on 3 Mar 2026. */
export const lateralRow = (given: Partial<LateralLineRow> = {}): LateralLineRow => ({
  id: 'row-1',
  aspect: 'preference',
  track: 'hand-use-10|guardian',
  measure: 'Hand use in ten everyday activities',
  occasion: '2026-03-03',
  value: -88.235,
  side: 'left',
  interval: null,
  chance: null,
  basis: '9 of 10 activities answered',
  caution: null,
  cutOffs: { name: '40 either side', left: -40, right: 40, inclusive: true },
  informant: 'Parent or carer',
  latest: true,
  source: { kind: 'questionnaire', id: 'q-1' },
  ...given,
})

const noCutOffs = { cutOffs: null, informant: null, source: { kind: 'measure' as const, id: 'm-1' } }

/** Every kind of row once, and an earlier occasion of the first. */
export const lateralRows = (): LateralLineRow[] => [
  lateralRow(),
  lateralRow({ id: 'row-0', occasion: '2025-09-02', value: -46.7, latest: false }),
  lateralRow({
    id: 'row-2',
    track: 'hand-use-10|teacher',
    informant: 'Teacher',
    value: null,
    side: null,
    basis: '4 of 10 activities answered',
    caution: 'Not scorable: fewer than 6 answered',
  }),
  lateralRow({
    ...noCutOffs,
    id: 'row-3',
    aspect: 'reaching',
    track: 'reaching',
    measure: 'Reaching across the midline',
    value: -33.333,
    side: 'middle',
    chance: { low: -42.9, high: 42.9 },
    basis: '21 reaches, 14 with the left hand',
  }),
  lateralRow({
    ...noCutOffs,
    id: 'row-4',
    aspect: 'skill',
    track: 'pegs',
    measure: 'Moving pegs',
    value: 6.4,
    side: 'right',
    interval: { low: 1.2, high: 11.6 },
    basis: '5 trials with each hand',
  }),
  lateralRow({
    ...noCutOffs,
    id: 'row-5',
    aspect: 'foot',
    track: 'foot',
    measure: 'Foot',
    value: 0,
    side: 'middle',
    basis: '12 of 12 tries',
  }),
]

export const reportContent = (given: Partial<ConclusionContent> = {}): ConclusionContent => ({
  handPreference: 'left_emerging',
  confidence: 'medium',
  evidence: [],
  strengths: '- Mara draws maps with many small signs.\n- Mara stays with a task until it works.',
  mattersToChild: 'To finish a comic by herself.',
  reasoning:
    'Asked and seen, the left hand is chosen for nearly everything.\n\nReaching follows less clearly, as is ordinary at this age.',
  plan: 'advice',
  planDetail: 'Advice for home and school.\n- Page turned clockwise.\n- Left-handed scissors.',
  aboutDisagreements: 'Pegs were new to her; the right hand went second and had the practice.',
  ...given,
})

/** A signed conclusion with all that the report prints. */
export const reportForPrint = (given: Partial<ReportForPrint> = {}): ReportForPrint => ({
  content: reportContent(),
  evidence: {
    age: '8 y 1 m',
    lateralLine: lateralRows(),
    evidence: [
      {
        kind: 'measure',
        id: 'm-1',
        on: '2026-03-03',
        words: 'Reaching across the midline, 3 Mar 2026: 14 left, 7 right',
      },
    ],
    contradictions: ['The right hand does better at Moving pegs of 3 Mar 2026: +6.4.'],
    statements: ['The questionnaires agree on the left hand.'],
    citations: ['Oldfield RC. 1971. Neuropsychologia 9:97-113.'],
    cautions: ['Preference and skill are different things and are not averaged.'],
    head: {
      childName: 'Mara Example',
      recordNumber: 'FF-2026-0001',
      birthDate: '2018-01-09',
      author: 'Ada Writer',
      clinic: {
        clinicName: 'Example Children’s Clinic',
        clinicAddress: '3 Example Lane\nExampletown',
        clinicPhone: '01632 960 000',
        timeZone: 'Europe/London',
      },
    },
  },
  signedAt: '2026-03-10T23:30:00.000Z',
  countersigned: { by: 'Lea Approver', at: '2026-03-11T09:00:00.000Z' },
  ...given,
})
