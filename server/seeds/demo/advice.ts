import type { DemoAdvice, Offset } from './demoTypes.ts'
import type { StaffKey, TeacherKey } from './people.ts'

type Reply = DemoAdvice['items'][number]['reply']

const done = (day: Offset, by: TeacherKey): Reply => ({ answer: 'done', reason: null, day, by })
const trying = (day: Offset, by: TeacherKey): Reply => ({ answer: 'trying', reason: null, day, by })
const cannot = (day: Offset, by: TeacherKey, reason: string): Reply => ({ answer: 'cannot', reason, day, by })

function advice(
  child: number,
  by: StaffKey,
  publishedDay: Offset,
  items: [itemId: string, because: string, reply?: Reply][],
  endedDay: Offset | null = null,
): DemoAdvice {
  return {
    child,
    by,
    publishedDay,
    checkByDay: publishedDay + 21,
    items: items.map(([itemId, because, reply]) => ({ itemId, because, reply: reply ?? null })),
    endedDay,
  }
}

/** Advice for school. The reason is for the teacher: about the place and the tools, nothing clinical. */
export const adviceGiven: readonly DemoAdvice[] = [
  advice(1, 'adaeze', -70, [
    [
      'S01',
      'Mateo writes with the left hand and sits on the right of a right-handed friend, so their elbows meet.',
      done(-66, 'kwabena'),
    ],
    ['W01', 'His arm needs room to move along the line.', done(-66, 'kwabena')],
    ['W02', 'He then sees what he has written and his hand stays off it.', trying(-58, 'kwabena')],
  ]),
  advice(2, 'adaeze', -86, [
    [
      'W08',
      'Anouk writes clearly and without effort this way. Please help us by leaving it as it is.',
      done(-80, 'kwabena'),
    ],
    [
      'S02',
      'Her desk stands close to the window wall and her left arm needs space.',
      cannot(-80, 'kwabena', 'The desks on that side are fixed. Could she move to the middle block?'),
    ],
  ]),
  advice(3, 'rohan', -82, [
    ['W21', 'Short pauses let Idris write for longer.', done(-75, 'kwabena')],
    ['S05', 'The desk is high for him at the moment.', trying(-75, 'kwabena')],
  ]),
  advice(4, 'mairi', -98, [
    [
      'W22',
      'Soraya writes Dari from right to left at home; the family will show you how the page lies.',
      done(-85, 'kwabena'),
    ],
    ['W17', 'Copying is easier for her from a sheet beside the page.', done(-85, 'kwabena')],
  ]),
  advice(
    6,
    'adaeze',
    -265,
    [
      ['T01', 'Class scissors fold the paper in Poppy’s left hand.', done(-250, 'kwabena')],
      ['S05', 'Her feet do not reach the floor on the class chair.', done(-250, 'kwabena')],
    ],
    -40,
  ),
  advice(7, 'ines', -16, [
    ['H01', 'Noor is still choosing a hand and may take her time.'],
    ['H02', 'Your tally by activity will help us when she comes.'],
  ]),
  advice(13, 'adaeze', -76, [
    ['H08', 'Amara does well when her way of working is simply taken for granted.', done(-70, 'siobhan')],
    ['W15', 'New letters are easier for her when she sees them from the front.', trying(-70, 'siobhan')],
  ]),
  advice(15, 'tomasz', -84, [
    ['H08', 'Priya does best when nobody remarks on which hand she takes.', done(-60, 'siobhan')],
  ]),
  advice(
    16,
    'rohan',
    -100,
    [
      ['S01', 'Callum’s elbow and his friend’s meet at the double desk.', done(-88, 'siobhan')],
      ['S05', 'He sits better with something under his feet.', trying(-88, 'siobhan')],
    ],
    -9,
  ),
  advice(17, 'mairi', -58, [
    ['W13', 'Mei-Lin is pleased when she finds a turned letter by herself.', trying(-40, 'siobhan')],
    ['W12', 'She sometimes begins at the right edge.', done(-40, 'siobhan')],
  ]),
  advice(18, 'adaeze', -55, [
    ['T01', 'Seun’s cards come out smooth with the right blades.', done(-38, 'siobhan')],
    ['T03', 'This way round he sees the line.', done(-38, 'siobhan')],
    ['T05', 'Good habits for the whole table.', done(-38, 'siobhan')],
  ]),
  advice(22, 'mairi', -144, [
    ['S05', 'Leilani’s chair and desk are too high for her.', trying(-130, 'kwabena')],
  ]),
  advice(23, 'adaeze', -76, [
    ['W02', 'Hamza’s page lies straight and his hand follows the ink.', trying(-60, 'kwabena')],
    ['S04', 'Light from the left puts his hand’s shadow on the line.'],
  ]),
  advice(26, 'rohan', -66, [
    ['S01', 'Esther’s elbow meets her neighbour’s.', done(-55, 'kwabena')],
    ['T09', 'Her work smears because the ink stays wet under the hand.', done(-55, 'kwabena')],
  ]),
  advice(30, 'ines', -25, [
    ['E01', 'In practice papers the question sheet lay under Tui’s arm.', trying(-18, 'kwabena')],
  ]),
  advice(34, 'mairi', -74, [
    ['K01', 'Youssef works best when he may choose the side of the mouse.', done(-60, 'hyejin')],
    ['K02', 'Typing notes lets him keep up with what he hears.', trying(-60, 'hyejin')],
    ['S01', 'Elbows meet at the double desk.', done(-60, 'hyejin')],
  ]),
  advice(35, 'adaeze', -18, [
    ['S02', 'Harriet’s writing arm meets the wall at her present place.'],
    ['S04', 'Light from the left puts her hand’s shadow on the line.'],
  ]),
  advice(37, 'rohan', -64, [
    ['W21', 'Pauses and typing let Saoirse answer in full.', done(-50, 'hyejin')],
    ['E02', 'We are gathering measures for the application; the board decides.', trying(-50, 'hyejin')],
  ]),
]
