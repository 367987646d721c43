import type { DemoMeasure } from './assessmentTypes.ts'
import { dots, pegs, reaching, seating, sides, tapping } from './measureParts.ts'

const leftFooted = { kick: 'LLL', hop: 'LLR', step_up: 'LLL', pebble: 'LLL' }
const rightFooted = { kick: 'RRR', hop: 'RRL', step_up: 'RRR', pebble: 'RRR' }
const eitherFooted = { kick: 'LRL', hop: 'RRL', step_up: 'RRR', pebble: 'LL-' }

export const measures01to20: readonly DemoMeasure[] = [
  reaching(1, -124, 'adaeze', 'LLL LLL LLL LLL LLR LLL LRL'),
  pegs(1, -124, 'adaeze', 'L17.4 R20.9 R19.8 L16.9 L17.8 R20.3'),
  dots(1, -124, 'adaeze', 'L38 R29 R31 L40 L37 R30'),
  sides(1, -124, 'adaeze', leftFooted, { far: 'RRR', near: 'RRL' }),
  seating(1, -124, 'adaeze', {
    poplitealCm: 34.5,
    shoeCm: 2,
    seatHeightCm: 35,
    elbowHeightCm: 17,
    shoulderHeightCm: 40,
    deskHeightCm: 54,
    feetFlat: 'yes',
    leftClearanceCm: 60,
    neighbourHand: 'right',
    lightSide: 'left',
  }),
  pegs(1, -28, 'adaeze', 'R19.2 L16.1 L16.4 R19.7 R18.8 L15.7', {
    comment: 'Quicker with both hands than in summer: he knew the board.',
  }),
  dots(1, -28, 'adaeze', 'R32 L42 L43 R31 R33 L41'),

  reaching(2, -97, 'adaeze', 'LLL LLL LLL LLL LLL LLR LLL'),
  pegs(2, -97, 'adaeze', 'R18.9 L16.8 L16.2 R18.1 R18.5 L16.6'),
  sides(2, -97, 'adaeze', leftFooted, { far: 'LLL', near: 'LLL' }),

  reaching(3, -98, 'rohan', 'LLL LLL LLL LLL LLL LRL LLR'),
  pegs(3, -98, 'rohan', 'L18.8 R21.4 R20.6 L18.1 L18.5 R21.0'),
  tapping(3, -98, 'rohan', 'L83 R80 R78 L74 L70 R80', {
    comment: 'The left slows from trial to trial; he shook the hand out.',
  }),
  seating(3, -98, 'rohan', {
    poplitealCm: 33.5,
    shoeCm: 2,
    seatHeightCm: 35,
    elbowHeightCm: 16,
    shoulderHeightCm: 38.5,
    deskHeightCm: 57,
    feetFlat: 'yes',
    leftClearanceCm: 80,
    neighbourHand: 'right',
    lightSide: 'above',
  }),
  tapping(3, -24, 'rohan', 'R83 L88 L86 R81 R85 L87'),

  reaching(4, -125, 'mairi', 'LLL LLL LLL LLR LLL LLR LRL'),
  pegs(4, -125, 'mairi', 'L19.6 R21.2 R22.0 L18.9 L19.1 R20.8'),
  sides(4, -125, 'mairi', eitherFooted, { far: 'LLL', near: 'LRL' }),

  reaching(5, -250, 'tomasz', 'LLL LLL LLL LRL LLL LLL LLR'),
  pegs(5, -250, 'tomasz', 'R22.4 L18.9 L19.5 R21.6 R23.0 L19.2'),

  reaching(6, -290, 'adaeze', 'LLL LLL LLL LLL LLL LLL LLL'),
  pegs(6, -290, 'adaeze', 'L19.8 R25.1 R24.4 L20.3 L19.4 R25.9'),

  reaching(10, -33, 'rohan', 'LLL LLl LLR LRL RRL rRL RRR', {
    comment: 'Each hand keeps to its own side; two cards were passed across at the middle.',
  }),
  pegs(10, -33, 'rohan', 'L27.9 R28.6 R27.2 L29.3 L27.0 R28.1'),
  dots(10, -33, 'rohan', 'R17 L19 L16 R18 R19 L17'),
  sides(10, -33, 'rohan', eitherFooted, { far: 'RRR', near: 'RLR' }),

  reaching(11, -42, 'mairi', 'LLL LLL LLL LRL LLL LLR LRL'),
  pegs(11, -42, 'mairi', 'L25.8 R31.4 R30.2 L24.9 L26.3 R32.5'),
  sides(11, -42, 'mairi', leftFooted, { far: 'LLL', near: 'LLR' }),
  reaching(12, -42, 'mairi', 'RLR RRR RRR RRR RRR RRR RRR'),
  pegs(12, -42, 'mairi', 'R24.7 L29.9 L31.2 R25.6 R26.0 L30.4'),
  sides(12, -42, 'mairi', rightFooted, { far: 'RRR', near: 'RRR' }),

  reaching(13, -80, 'adaeze', 'LLL LLL LLR LLL LRL LLL LRR', {
    comment: 'Looked at her grandmother before the first three cards; reached freely after that.',
  }),
  pegs(13, -80, 'adaeze', 'L24.6 R29.8 R28.9 L23.8 L25.1 R30.6'),

  reaching(15, -104, 'tomasz', 'LLL LLL LLR LRL RLL LRR RLR', {
    comment: 'Began four reaches with the left and stopped to look up.',
  }),
  pegs(15, -104, 'tomasz', 'R26.8 L21.9 L21.4 R29.2 R25.1 L22.3'),
  dots(15, -104, 'tomasz', 'L27 R19 R22 L28 L27 R17'),
  sides(15, -104, 'tomasz', leftFooted, { far: 'RRR', near: 'RRR' }),
  reaching(15, -30, 'tomasz', 'LLL LLL LLL LLL LLR LLR LLL'),
  pegs(15, -30, 'tomasz', 'L20.2 R25.4 R24.6 L20.7 L19.9 R25.9'),
  dots(15, -30, 'tomasz', 'R21 L31 L29 R22 R20 L30'),

  reaching(16, -118, 'rohan', 'LLL LLL LLL LLR LLL LLL LRL'),
  pegs(16, -118, 'rohan', 'R26.7 L22.8 L23.5 R27.9 R26.1 L22.4'),

  reaching(17, -70, 'mairi', 'LLL LLL LLL LLL LLR LLL LLR'),
  pegs(17, -70, 'mairi', 'L22.6 R26.8 R27.4 L23.3 L22.1 R26.2'),
  sides(17, -70, 'mairi', rightFooted, { far: 'LLL', near: 'LLL' }),

  reaching(18, -66, 'adaeze', 'LLL LLL LLL LLL LRL LLR LLL'),
  pegs(18, -66, 'adaeze', 'L21.8 R20.1* R25.3 R24.6 L22.5 L21.3 R25.8', {
    comment: 'One trial was broken off when the board slipped; it was taken again.',
  }),

  reaching(20, -170, 'tomasz', 'LLL LLL LLR RLR RRL RRR RRR'),
  pegs(20, -170, 'tomasz', 'R21.5 L21.9 L20.8 R21.2 R20.6 L21.4'),
  sides(20, -170, 'tomasz', rightFooted, { far: 'RRR', near: 'LLL' }),
]
