import type { DemoMeasure } from './assessmentTypes.ts'
import { dots, notDone, pegs, reaching, seating, sides, tapping } from './measureParts.ts'

const leftFooted = { kick: 'LLL', hop: 'LLL', step_up: 'LRL', pebble: 'LLL' }
const rightFooted = { kick: 'RRR', hop: 'RRR', step_up: 'RLR', pebble: 'RRR' }
const eitherFooted = { kick: 'RRR', hop: 'LLR', step_up: 'LRL', pebble: 'RR-' }

export const measures21to40: readonly DemoMeasure[] = [
  reaching(21, -90, 'rohan', 'LLL LLL LLL LLL LLL LRL LLR'),
  pegs(21, -90, 'rohan', 'R26.1 L22.9 L23.8 R27.3 R25.6 L22.4'),
  tapping(21, -90, 'rohan', 'L72 R67 R62 L77 L70 R64'),

  reaching(22, -160, 'mairi', 'LLL LLL LLL LLL LLL LLL LRL'),
  pegs(22, -160, 'mairi', 'L21.2 R24.8 R25.5 L20.6 L21.8 R24.1'),
  seating(
    22,
    -160,
    'mairi',
    {
      poplitealCm: 28.5,
      statureCm: 113,
      shoeCm: 1.5,
      seatHeightCm: 38,
      seatDepthCm: 36,
      buttockPoplitealCm: 35,
      elbowHeightCm: 14.5,
      shoulderHeightCm: 35,
      deskHeightCm: 64,
      feetFlat: 'no',
      leftClearanceCm: 55,
      neighbourHand: 'right',
      lightSide: 'left',
    },
    { comment: 'The class chair and desk are two sizes too large; her feet hang.' },
  ),
  seating(
    22,
    -60,
    'mairi',
    {
      poplitealCm: 29,
      statureCm: 115,
      shoeCm: 1.5,
      seatHeightCm: 34,
      seatDepthCm: 31,
      buttockPoplitealCm: 35.5,
      elbowHeightCm: 14.5,
      shoulderHeightCm: 35.5,
      deskHeightCm: 58,
      feetFlat: 'yes',
      leftClearanceCm: 70,
      neighbourHand: 'left',
      lightSide: 'above',
    },
    {
      comment:
        'Lower chair and desk since spring. Still too high by the numbers: the footrest makes up for it.',
    },
  ),

  reaching(23, -96, 'adaeze', 'LLL LLR LLL LRL LLR LRR RLR', {
    comment: 'In a hurry: took whichever card came first with whichever hand was free.',
  }),
  pegs(23, -96, 'adaeze', 'L20.4 R22.9 R23.6 L19.8 L20.9 R23.1'),

  reaching(24, -105, 'tomasz', 'LLL LLL LLL LLL LRL LLL LLR'),
  pegs(24, -105, 'tomasz', 'R24.2 L20.8 L21.5 R23.7 R24.9 L21.1'),

  reaching(26, -84, 'rohan', 'LLL LLL LLL LLL LLL LLL LLR'),
  pegs(26, -84, 'rohan', 'L16.3 R18.8 R19.4 L15.9 L16.7 R18.5'),

  reaching(27, -205, 'adaeze', 'LLL LLL LLL LRL LLL LLR LLR'),
  pegs(27, -205, 'adaeze', 'L16.9 R19.3 R19.9 L17.4 L16.5 R18.8'),
  notDone(
    27,
    -40,
    'adaeze',
    'pegs',
    'Left arm in plaster: nothing is timed until the fracture clinic agrees.',
  ),

  reaching(28, -345, 'mairi', 'LLL LLR LLL LLL LRL LLR LRL'),
  pegs(28, -345, 'mairi', 'L22.8 R26.9 R25.7 L24.1 L23.2 R27.4'),

  reaching(29, -128, 'tomasz', 'LLL LLL LLL LLL LLL LLL LRL'),
  pegs(29, -128, 'tomasz', 'R17.8 L15.1 L15.6 R17.2 R18.1 L14.9'),

  reaching(31, -30, 'adaeze', 'LLL LLL LLR LRL RRL RRR RRR', {
    comment: 'Whichever hand is nearer takes the card; no card changed hands.',
  }),
  pegs(31, -30, 'adaeze', 'R14.6 L14.9 L14.3 R14.2 R14.8 L14.6'),
  dots(31, -30, 'adaeze', 'L44 R43 R45 L43 L46 R44'),
  sides(31, -30, 'adaeze', rightFooted, { far: 'LLL', near: 'RRR' }),

  reaching(32, -27, 'rohan', 'LLL LLL LLR LLL LLL LRL LRL'),
  pegs(32, -27, 'rohan', 'L15.2 R16.9 R16.4 L14.8 L15.5 R17.2'),
  tapping(32, -27, 'rohan', 'R92 L99 L102 R90 R94 L100'),
  sides(32, -27, 'rohan', leftFooted, { far: 'RRR', near: 'RRR' }),

  reaching(33, -360, 'tomasz', 'LLL LLL LLL LLL LLL LLL LLL', {
    comment: 'The cards on the right were laid nearer, so that she could reach them from the chair.',
  }),
  pegs(33, -360, 'tomasz', 'L15.8 L15.1 L15.4', {
    comment: 'Left hand only. The right was not asked for: its weakness is known since birth.',
  }),
  tapping(33, -94, 'tomasz', 'L104 R27 R22 L109 L102 R28', {
    comment: 'She wished to see what the right hand does. No change from the figures of the hospital.',
  }),
  seating(
    33,
    -94,
    'tomasz',
    {
      elbowHeightCm: 20,
      shoulderHeightCm: 45,
      seatHeightCm: 48,
      deskHeightCm: 70,
      leftClearanceCm: 110,
      lightSide: 'above',
    },
    { comment: 'In her powered chair, feet on its plates.' },
  ),

  reaching(34, -92, 'mairi', 'LLL LLL LLL LLL LLR LLL LLL'),
  tapping(34, -92, 'mairi', 'L107 R95 R98 L110 L105 R92'),

  reaching(35, -21, 'adaeze', 'LLL LLL LLL LLR LLL LRL LLL'),
  pegs(35, -21, 'adaeze', 'L13.6 R15.2 R14.8 L13.9 L13.3 R15.5'),
  sides(
    35,
    -21,
    'adaeze',
    rightFooted,
    { far: 'LLL', near: 'LLL' },
    { listen: 'LLL', phone: 'LLL' },
    { comment: 'Listens with the left ear: the hearing aid is on the right.' },
  ),

  reaching(36, -262, 'tomasz', 'LLL LLL LLL LLL LLL LLR LLL'),
  pegs(36, -262, 'tomasz', 'R15.9 L13.8 L14.2 R15.4 R16.3 L13.5'),

  reaching(37, -78, 'rohan', 'LLL LLL LLL LLL LLL LLL LLR'),
  pegs(37, -78, 'rohan', 'L12.9 R14.4 R14.0 L13.3 L13.1 R14.7'),
  tapping(37, -78, 'rohan', 'L108 R100 R102 L98* L101 L91 R99', {
    comment: 'She stopped the third one and asked for a rest. The left falls off as it goes on.',
  }),

  reaching(38, -220, 'mairi', 'LLL LLL LLR LRL LLR RLL RRL'),
  pegs(38, -220, 'mairi', 'L13.1 R13.9 R13.6 L12.8 L13.4 R14.2'),
  sides(38, -220, 'mairi', eitherFooted, { far: 'RRR', near: 'RRR' }),

  reaching(39, -14, 'adaeze', 'RLR RRR RRR RRR RRR RRR RRR', {
    comment:
      'With the doctor’s agreement, sitting, no timing of the left. How it is now, not which hand she prefers.',
  }),

  reaching(40, -410, 'tomasz', 'LLL LLL LLL LLL LLL LLL LLL'),
  pegs(40, -410, 'tomasz', 'R12.9 L11.2 L11.6 R13.4 R12.6 L11.0'),
]
