import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { offeredAdvice } from '../../shared/advice.ts'
import { unknownFacts, type AdviceFacts } from '../../shared/adviceFacts.ts'
import { adviceAudiences } from '../../shared/adviceItem.ts'
import { adviceItemById, adviceItems } from '../../shared/adviceItems.ts'
import { asksToSwitchHand } from '../../shared/handSwitching.ts'
import { readingLevel, readingTarget } from '../../shared/readingLevel.ts'
import { checkWording } from '../../shared/wording.ts'

type Known = Partial<AdviceFacts>

const years = (n: number) => n * 12
const leftWriter: Known = { writingHand: 'left', scriptDirection: 'ltr' }
const aged = (n: number, known: Known): AdviceFacts => ({
  ...unknownFacts,
  ...leftWriter,
  ageMonths: years(n),
  ...known,
})

/** Ids offered to anyone. */
const offered = (facts: AdviceFacts): string[] => [
  ...new Set(
    adviceAudiences.flatMap((audience) => offeredAdvice(facts, audience).map(({ item }) => item.id)),
  ),
]

interface Row {
  id: string
  age: number
  /** Facts that call for the item, each row one way. */
  yes: Known[]
  /** The same facts, known, that do not. */
  no: Known[]
  /** The same facts not known. */
  unknown: Known
}

// Triggers as the clinic's advice library sets them: the sources of each item stand beside it in the library;
// thresholds without a published figure (offset -3 cm, 40 cm of space, 45° to the board) are the clinic's own.
const rows: Row[] = [
  {
    id: 'W01',
    age: 8,
    yes: [{ paperOffsetCm: 0 }, { paperOffsetCm: 12 }, { paperOffsetCm: -2.9 }],
    no: [{ paperOffsetCm: -3 }, { paperOffsetCm: -10 }],
    unknown: { paperOffsetCm: null },
  },
  {
    id: 'W02',
    age: 8,
    yes: [{ paperTiltDegrees: 0 }, { paperTiltDegrees: 14 }, { paperTiltDegrees: -30 }],
    no: [{ paperTiltDegrees: 15 }, { paperTiltDegrees: 35 }],
    unknown: { paperTiltDegrees: null },
  },
  {
    id: 'W03',
    age: 8,
    yes: [{ otherHandSteadies: 'no' }, { otherHandSteadies: 'partly' }],
    no: [{ otherHandSteadies: 'yes' }],
    unknown: { otherHandSteadies: null },
  },
  {
    id: 'W04',
    age: 8,
    yes: [{ wristBendsLowOnPage: true }],
    no: [{ wristBendsLowOnPage: false }],
    unknown: { wristBendsLowOnPage: null },
  },
  {
    id: 'W05',
    age: 8,
    yes: [
      { fingerToTipMm: 19 },
      { smudge: 'light' },
      { smudge: 'heavy' },
      { fingerToTipMm: 30, smudge: 'light' },
    ],
    no: [{ fingerToTipMm: 20 }, { smudge: 'none' }],
    unknown: { fingerToTipMm: null, smudge: null },
  },
  {
    id: 'W06',
    age: 8,
    yes: [{ grip: 'dynamic_tripod' }, { grip: 'lateral_quadrupod' }],
    no: [{ grip: 'palmar' }, { grip: 'changing' }],
    unknown: { grip: null },
  },
  {
    id: 'W07',
    age: 7,
    yes: [{ wristPosture: 'above_line' }],
    no: [{ wristPosture: 'below_line' }, { wristPosture: 'beside_line' }],
    unknown: { wristPosture: null },
  },
  {
    id: 'W08',
    age: 8,
    yes: [{ wristPosture: 'above_line', painAfter: 0, legiblePercent: 90 }],
    no: [
      { wristPosture: 'above_line', painAfter: 1, legiblePercent: 96 },
      { wristPosture: 'above_line', painAfter: 0, legiblePercent: 89.9 },
      { wristPosture: 'below_line', painAfter: 0, legiblePercent: 96 },
    ],
    unknown: { wristPosture: 'above_line', painAfter: null, legiblePercent: 96 },
  },
  {
    id: 'W09',
    age: 8,
    yes: [{ wristExtensionDegrees: -15 }],
    no: [{ wristExtensionDegrees: 0 }, { wristExtensionDegrees: 30 }],
    unknown: { wristExtensionDegrees: null },
  },
  {
    id: 'W10',
    age: 8,
    yes: [{ pressure: 'heavy' }],
    no: [{ pressure: 'medium' }, { pressure: 'light' }],
    unknown: { pressure: null },
  },
  {
    id: 'W11',
    age: 8,
    yes: [{ slantRemarked: true }],
    no: [{ slantRemarked: false }],
    unknown: { slantRemarked: null },
  },
  {
    id: 'W12',
    age: 6,
    yes: [{ startsAtRight: true }, { mirrorWords: true }],
    no: [{ startsAtRight: false, mirrorWords: false }],
    unknown: { startsAtRight: null, mirrorWords: null },
  },
  {
    id: 'W13',
    age: 6,
    yes: [{ reversals: 1 }, { reversals: 9 }],
    no: [{ reversals: 0 }],
    unknown: { reversals: null },
  },
  {
    id: 'W14',
    age: 6,
    yes: [{ crossStrokeTrouble: true }],
    no: [{ crossStrokeTrouble: false }],
    unknown: { crossStrokeTrouble: null },
  },
  {
    id: 'W15',
    age: 6,
    yes: [{ writingStage: 'learning_letters' }],
    no: [{ writingStage: 'writing' }, { writingStage: 'first_strokes' }],
    unknown: { writingStage: null },
  },
  {
    id: 'W16',
    age: 5,
    yes: [{ writingStage: 'first_strokes' }],
    no: [{ writingStage: 'learning_letters' }],
    unknown: { writingStage: null },
  },
  {
    id: 'W17',
    age: 8,
    yes: [{ copyingSlow: true }],
    no: [{ copyingSlow: false }],
    unknown: { copyingSlow: null },
  },
  {
    id: 'W18',
    age: 8,
    yes: [{ handCoversModel: true }],
    no: [{ handCoversModel: false }],
    unknown: { handCoversModel: null },
  },
  {
    id: 'W19',
    age: 8,
    yes: [{ goalTopics: ['handwriting'] }, { goalTopics: ['handwriting'], painAfter: 3 }],
    no: [{ goalTopics: ['dressing'] }, { goalTopics: ['handwriting'], painAfter: 4 }],
    unknown: { goalTopics: [] },
  },
  {
    id: 'W20',
    age: 8,
    yes: [{ concerns: ['speed'] }, { concerns: ['speed'], lettersPerMinute: 41 }],
    no: [{ concerns: ['handwriting'], lettersPerMinute: 41 }],
    unknown: { concerns: [] },
  },
  {
    id: 'W21',
    age: 8,
    yes: [{ painAfter: 3 }, { painAfter: 10 }],
    no: [{ painAfter: 0 }, { painAfter: 2.9 }],
    unknown: { painAfter: null },
  },
  {
    id: 'W22',
    age: 8,
    yes: [{ scriptDirection: 'rtl' }, { scriptDirection: 'both' }],
    no: [{ scriptDirection: 'ltr' }],
    unknown: { scriptDirection: null },
  },
  {
    id: 'T01',
    age: 6,
    yes: [{ cuttingHand: 'left' }, { cuttingHand: 'left', writingHand: null }],
    no: [{ cuttingHand: 'right' }, { cuttingHand: 'swaps' }],
    unknown: { cuttingHand: null },
  },
  {
    id: 'T02',
    age: 6,
    yes: [{ cuttingHand: 'left', sharesScissorPot: true }],
    no: [
      { cuttingHand: 'left', sharesScissorPot: false },
      { cuttingHand: 'right', sharesScissorPot: true },
    ],
    unknown: { cuttingHand: 'left', sharesScissorPot: null },
  },
  {
    id: 'T03',
    age: 6,
    yes: [{ cuttingHand: 'left', cuttingStage: 'jagged' }],
    no: [
      { cuttingHand: 'left', cuttingStage: 'steady' },
      { cuttingHand: 'right', cuttingStage: 'jagged' },
    ],
    unknown: { cuttingHand: 'left', cuttingStage: null },
  },
  {
    id: 'T04',
    age: 6,
    yes: [{ cuttingHand: 'right', cuttingStage: 'steady' }],
    no: [
      { cuttingHand: 'right', cuttingStage: 'jagged' },
      { cuttingHand: 'left', cuttingStage: 'steady' },
    ],
    unknown: { cuttingHand: 'right', cuttingStage: null },
  },
  {
    id: 'T05',
    age: 6,
    yes: [
      { cuttingHand: 'left' },
      { cuttingHand: 'right', cuttingStage: 'steady' },
      { cuttingStage: 'starting' },
    ],
    no: [{ cuttingHand: 'right', cuttingStage: 'jagged' }],
    unknown: { cuttingHand: null, cuttingStage: null },
  },
  {
    id: 'T06',
    age: 4,
    yes: [{ cuttingStage: 'starting' }, { cuttingStage: 'starting', writingHand: 'right' }],
    no: [{ cuttingStage: 'steady' }],
    unknown: { cuttingStage: null },
  },
  {
    id: 'T07',
    age: 8,
    yes: [{ rulerTrouble: true }],
    no: [{ rulerTrouble: false }],
    unknown: { rulerTrouble: null },
  },
  {
    id: 'T08',
    age: 8,
    yes: [{ sharpenerTrouble: true }],
    no: [{ sharpenerTrouble: false }],
    unknown: { sharpenerTrouble: null },
  },
  {
    id: 'T09',
    age: 8,
    yes: [{ smudge: 'light' }, { smudge: 'heavy' }],
    no: [{ smudge: 'none' }],
    unknown: { smudge: null },
  },
  {
    id: 'T10',
    age: 8,
    yes: [{ smudge: 'heavy' }, { paperTears: true }],
    no: [{ smudge: 'none', paperTears: false }],
    unknown: { smudge: null, paperTears: null },
  },
  {
    id: 'T11',
    age: 8,
    yes: [{ ringsUnderArm: true }],
    no: [{ ringsUnderArm: false }],
    unknown: { ringsUnderArm: null },
  },
  {
    id: 'T12',
    age: 8,
    yes: [{ usesWipeBoard: true }],
    no: [{ usesWipeBoard: false }],
    unknown: { usesWipeBoard: null },
  },
  {
    id: 'T13',
    age: 8,
    yes: [{ slumps: true }, { wristPosture: 'above_line' }],
    no: [{ slumps: false, wristPosture: 'below_line' }],
    unknown: { slumps: null, wristPosture: null },
  },
  {
    id: 'S01',
    age: 8,
    yes: [{ elbowClash: true }, { deskType: 'double' }, { deskType: 'double', seatSide: 'right' }],
    no: [
      { elbowClash: false, deskType: 'single' },
      { deskType: 'double', seatSide: 'left' },
    ],
    unknown: { elbowClash: null, deskType: null },
  },
  {
    id: 'S02',
    age: 8,
    yes: [{ leftClearanceCm: 0 }, { leftClearanceCm: 39 }],
    no: [{ leftClearanceCm: 40 }],
    unknown: { leftClearanceCm: null },
  },
  {
    id: 'S03',
    age: 8,
    yes: [{ boardAngleDegrees: 46 }, { boardAngleDegrees: -60 }],
    no: [{ boardAngleDegrees: 45 }, { boardAngleDegrees: 0 }],
    unknown: { boardAngleDegrees: null },
  },
  {
    id: 'S04',
    age: 8,
    yes: [{ lightSide: 'left' }],
    no: [{ lightSide: 'right' }, { lightSide: 'above' }],
    unknown: { lightSide: null },
  },
  {
    id: 'S05',
    age: 8,
    yes: [
      { feetFlat: false },
      { deskAboveElbowCm: 5.1 },
      { deskAboveElbowCm: 2.4 },
      { deskAboveElbowCm: -3 },
    ],
    no: [{ feetFlat: true, deskAboveElbowCm: 2.5 }, { deskAboveElbowCm: 5 }],
    unknown: { feetFlat: null, deskAboveElbowCm: null },
  },
  {
    id: 'S06',
    age: 11,
    yes: [{ deskType: 'side_tablet', tabletSide: 'right' }],
    no: [
      { deskType: 'side_tablet', tabletSide: 'left' },
      { deskType: 'single', tabletSide: null },
    ],
    unknown: { deskType: 'side_tablet', tabletSide: null },
  },
  {
    id: 'S07',
    age: 8,
    yes: [{ leftHandersGrouped: true }],
    no: [{ leftHandersGrouped: false }],
    unknown: { leftHandersGrouped: null },
  },
  {
    id: 'H01',
    age: 5,
    yes: [
      { handPreference: 'unclear' },
      { handPreference: 'left_emerging' },
      { handPreference: 'right_emerging' },
    ],
    no: [{ handPreference: 'left_settled' }],
    unknown: { handPreference: null },
  },
  {
    id: 'H02',
    age: 5,
    yes: [{ swapsWithinTask: true }, { handPreference: 'swaps_within_task' }],
    no: [{ swapsWithinTask: false, handPreference: 'mixed_steady_by_task' }],
    unknown: { swapsWithinTask: null, handPreference: null },
  },
  {
    id: 'H08',
    age: 6,
    yes: [
      { concerns: ['pressure_to_switch'] },
      { askedToSwitch: true },
      { askedToSwitch: true, writingHand: 'right' },
    ],
    no: [{ concerns: ['handwriting'], askedToSwitch: false }],
    unknown: { concerns: [], askedToSwitch: null },
  },
  {
    id: 'H09',
    age: 8,
    yes: [{ sidesCrossed: true }],
    no: [{ sidesCrossed: false }],
    unknown: { sidesCrossed: null },
  },
  {
    id: 'K01',
    age: 8,
    yes: [{ usesMouse: true }, { goalTopics: ['computer'] }],
    no: [{ usesMouse: false }],
    unknown: { usesMouse: null },
  },
  {
    id: 'K02',
    age: 9,
    yes: [{ goalTopics: ['speed'] }, { goalTopics: ['pain'] }],
    no: [{ goalTopics: ['handwriting'] }],
    unknown: { goalTopics: [] },
  },
  {
    id: 'E01',
    age: 10,
    yes: [{ examWithinThreeMonths: true }],
    no: [{ examWithinThreeMonths: false }],
    unknown: { examWithinThreeMonths: null },
  },
  {
    id: 'E02',
    age: 12,
    yes: [{ speedMeasuredLow: true }, { painAfter: 4 }],
    no: [{ speedMeasuredLow: false, painAfter: 3 }],
    unknown: { speedMeasuredLow: null, painAfter: null },
  },
  {
    id: 'X04',
    age: 8,
    yes: [{}],
    no: [{ writingHand: 'right' }, { writingHand: 'swaps' }],
    unknown: { writingHand: null },
  },
]

describe('the library', () => {
  const needed = [
    ...Array.from({ length: 22 }, (_, i) => `W${String(i + 1).padStart(2, '0')}`),
    ...Array.from({ length: 13 }, (_, i) => `T${String(i + 1).padStart(2, '0')}`),
    ...Array.from({ length: 7 }, (_, i) => `S${String(i + 1).padStart(2, '0')}`),
    ...['H01', 'H02', 'H08', 'H09', 'E01', 'E02', 'K01', 'K02', 'X04'],
  ]

  it('holds every item once, and a row below tests each', () => {
    expect(adviceItems.map(({ id }) => id).toSorted()).toEqual(needed.toSorted())
    expect(rows.map(({ id }) => id).toSorted()).toEqual(needed.toSorted())
    expect(adviceItemById('W02')?.caution).toContain('degrees')
    expect(adviceItemById('Z99')).toBeNull()
  })

  it.each(adviceItems)('$id never asks for another hand and uses no word the letters block', (item) => {
    const words = `${item.text} ${item.because} ${item.caution ?? ''}`
    expect(asksToSwitchHand(words, 'left')).toBe(false)
    expect(checkWording(words)).toEqual([])
  })

  // Target for families and schools: grade 6 ideal, above 8 warns.
  it.each(adviceItems)('$id gives its reason in one sentence a parent can read', (item) => {
    const { sentences, grade } = readingLevel(item.because)
    expect(sentences).toBe(1)
    expect(grade).toBeLessThanOrEqual(readingTarget.warnAbove)
  })

  it('shows the usual cautions where work can hurt', () => {
    expect(adviceItemById('T03')!.caution).toContain('adult')
    expect(adviceItemById('T05')!.source).toContain('school’s own safety rules')
    expect(adviceItemById('W21')!.caution).toContain('doctor')
    expect(adviceItemById('H08')!.caution).toContain('safeguarding')
  })
})

describe.each(rows)('$id', ({ id, age, yes, no, unknown }) => {
  it.each(yes.map((known) => [known]))('is offered for %j, with the fact in words', (known) => {
    const facts = aged(age, known)
    expect(offered(facts)).toContain(id)
    const item = adviceItemById(id)!
    for (const audience of item.audiences) {
      const found = offeredAdvice(facts, audience).find((one) => one.item.id === id)!
      expect(found.triggeredBy).toMatch(/^because \S+ \S+/)
      expect(found.triggeredBy).not.toMatch(/null|undefined|NaN/)
    }
  })

  it.each(no.map((known) => [known]))('is not offered for %j', (known) => {
    expect(offered(aged(age, known))).not.toContain(id)
  })

  it('is not offered while the fact is unknown', () => {
    expect(offered(aged(age, unknown))).not.toContain(id)
  })

  it('is not offered outside its ages or to an unknown age', () => {
    const item = adviceItemById(id)!
    for (const months of [years(item.ageFrom) - 1, years(item.ageTo + 1), null]) {
      expect(offered({ ...aged(age, yes[0]!), ageMonths: months })).not.toContain(id)
    }
    for (const months of [years(item.ageFrom), years(item.ageTo + 1) - 1]) {
      expect(offered({ ...aged(age, yes[0]!), ageMonths: months })).toContain(id)
    }
  })

  it('is offered to its own audiences only', () => {
    const facts = aged(age, yes[0]!)
    const to = adviceAudiences.filter((audience) =>
      offeredAdvice(facts, audience).some(({ item }) => item.id === id),
    )
    expect(to.toSorted()).toEqual([...adviceItemById(id)!.audiences].toSorted())
  })

  it('needs a known left writer, and a known left-to-right script, where it says so', () => {
    const item = adviceItemById(id)!
    const base = aged(age, yes[0]!)
    for (const writingHand of ['right', 'swaps', null] as const) {
      if (item.needsLeftWriter) expect(offered({ ...base, writingHand })).not.toContain(id)
    }
    for (const scriptDirection of ['rtl', null] as const) {
      if (item.leftToRightOnly) expect(offered({ ...base, scriptDirection })).not.toContain(id)
    }
  })
})

describe('offeredAdvice', () => {
  it('offers nothing when nothing is known', () => {
    expect(offered(unknownFacts)).toEqual([])
    expect(offered({ ...unknownFacts, ageMonths: years(8) })).toEqual([])
  })

  it('names the page right of the middle with its distance', () => {
    const [first] = offeredAdvice(aged(8, { paperOffsetCm: 8 }), 'teacher')
    expect(first).toMatchObject({
      item: { id: 'W01' },
      triggeredBy: 'because the page sits right of the middle (8 cm)',
    })
  })

  it('adds to a left-to-right item that it is for that script when the child writes both ways', () => {
    const facts = aged(8, { paperTiltDegrees: 0, scriptDirection: 'both' })
    const found = offeredAdvice(facts, 'teacher')
    expect(found.find(({ item }) => item.id === 'W02')!.caution).toContain('left to right only')
    expect(found.map(({ item }) => item.id)).toContain('W22')
  })

  it('leaves a settled, painless, readable hand above the line alone: no slope, no cue for the wrist', () => {
    const facts = aged(8, {
      wristPosture: 'above_line',
      wristExtensionDegrees: -20,
      painAfter: 0,
      legiblePercent: 96,
    })
    expect(offered(facts).filter((id) => ['W07', 'W08', 'W09', 'T13'].includes(id))).toEqual(['W08'])
  })

  it('never tells a right-hander, or a child who swaps, to move to the left seat of a shared desk or use left tools', () => {
    const facts = fc.record({
      writingHand: fc.constantFrom('right', 'swaps', null),
      ageMonths: fc.integer({ min: 36, max: 179 }),
      elbowClash: fc.option(fc.boolean()),
      deskType: fc.constantFrom('double', 'group_table', null),
      paperOffsetCm: fc.option(fc.integer({ min: -30, max: 30 })),
      smudge: fc.constantFrom('none', 'heavy', null),
      leftClearanceCm: fc.option(fc.nat(100)),
      cuttingHand: fc.constantFrom('right', 'swaps', null),
      cuttingStage: fc.constantFrom('starting', 'jagged', 'steady', null),
      askedToSwitch: fc.option(fc.boolean()),
    })
    fc.assert(
      fc.property(facts, (known) => {
        const full = { ...unknownFacts, scriptDirection: 'ltr', ...known } as AdviceFacts
        for (const audience of adviceAudiences) {
          for (const { item } of offeredAdvice(full, audience)) {
            expect(item.needsLeftWriter).toBe(false)
            expect(item.id).not.toMatch(/^T0[1-4]$/)
            expect(asksToSwitchHand(item.text)).toBe(false)
          }
        }
      }),
    )
  })
})
