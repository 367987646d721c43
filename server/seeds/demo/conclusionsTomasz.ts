import type { DemoConclusion } from './assessmentTypes.ts'
import { conclusionsBy } from './conclusionParts.ts'

const concludes = conclusionsBy('tomasz')

export const conclusionsTomasz: readonly DemoConclusion[] = [
  concludes(40, -395, 'left_settled', 'high', {
    matters: 'Showing in tests what he knows.',
    because:
      'He showed all ten activities with the left hand; all 21 reaches and the pegs agree. Writing is clear and takes him longer than the time given.',
    plan: ['block', 'Typing to test speed, and what school needs to see for it.'],
  }),
  concludes(33, -345, 'left_settled', 'high', {
    matters: 'Being quick enough to edit a newspaper.',
    because:
      'The left hand does everything, by need: the right side has been weak since birth and is followed by the paediatrician. Nothing is new. Pegs were timed with the left only.',
    plan: [
      'block',
      'One-handed typing, non-slip mat, one-handed ways with a coat. Any change of strength goes to the paediatrician at once.',
    ],
  }),
  concludes(36, -246, 'left_settled', 'high', {
    matters: 'Finishing before the bell.',
    because:
      'Home answers, reaching and pegs point to the left hand. He writes with great care and little speed.',
    plan: ['block', 'Six sessions on note form and pace.'],
  }),
  concludes(5, -230, 'left_settled', 'high', {
    matters: 'Not being the last one.',
    because:
      'Home answers, reaching and pegs point to the left hand. The right hand rests in his lap, so the page moves; scissors at school are right-handed.',
    plan: ['block', 'Helper hand on the page, left-handed scissors, six sessions.'],
  }),
  concludes(20, -150, 'mixed_steady_by_task', 'high', {
    matters: 'Going on as she is.',
    because:
      'Home and school differ on four activities and each is right about what it sees. Tried again and again, each job goes to one hand, the same one every time; reaching and pegs show no leading side. Mixed by task is fine when it is steady.',
    plan: ['advice', 'A page for school: let her choose for each job, and keep it so. No therapy is needed.'],
    disagreements:
      'The four activities that home and school tell differently are done with different tools in the two places.',
  }),
  concludes(29, -112, 'left_settled', 'high', {
    matters: 'Being asked to tell it before he writes it.',
    because:
      'Home answers, reaching and pegs point to the left hand. Ruler and compass are hard to hold with the helper hand as he sits now.',
    plan: ['block', 'Six sessions on tools for the ruler hand and half a page at a time.'],
  }),
  concludes(24, -90, 'left_settled', 'medium', {
    matters: 'A card to her brother, written alone.',
    because:
      'Her foster carer’s answers, reaching and pegs point to the left hand. What was before is not known, so the history says little.',
    plan: ['block', 'Eight sessions on letter shapes she has missed, at her own speed.'],
  }),
  concludes(15, -86, 'possibly_switched', 'low', {
    matters: 'Finding out which hand is hers.',
    because:
      'She was asked to use the right hand at five and writes with it. Pegs and dots are quicker and more even with the left. Home and school answers lie between the sides, what she shows herself goes to the left, and reaching is not beyond chance. It is early to say more.',
    plan: ['block', 'Both hands left free in drawing, nobody comments on either. Look again in two months.'],
    disagreements:
      'What she is asked to do and what she is good at point different ways. One helper’s request may be enough to explain it; nobody decides for her.',
  }),
  concludes(15, -29, 'possibly_switched', 'medium', {
    matters: 'The page for the other hand, when she asks for it.',
    because:
      'Since nobody comments she begins with the left in half of the lessons, by her own choice. Reaching is now beyond chance to the left and pegs and dots are as clear as before. She was asked to use the right hand at five.',
    plan: [
      'block',
      'Follow her choice from day to day. School sets up the page for whichever hand she takes.',
    ],
    disagreements:
      'Home and school still report the right hand for writing, which is what she was asked to do; shown and observed jobs go to the left.',
    replacesEarlier: true,
  }),
]
