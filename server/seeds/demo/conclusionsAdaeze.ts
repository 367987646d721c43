import type { DemoConclusion } from './assessmentTypes.ts'
import { conclusionsBy } from './conclusionParts.ts'

const concludes = conclusionsBy('adaeze')

export const conclusionsAdaeze: readonly DemoConclusion[] = [
  concludes(1, -110, 'left_settled', 'high', {
    matters: 'Reading his own stories back, and having room for his elbow.',
    because:
      'Home answers, reaching and both skill tasks point to the left hand, and the family has seen it since he was two. The page lies straight and to the right of his middle, so that the hand follows what it has written; the double desk puts two elbows together.',
    plan: ['block', 'Six sessions on page, grip height and speed. Advice to school on his seat.'],
  }),
  concludes(2, -88, 'left_settled', 'high', {
    matters: 'That nobody makes her write another way.',
    because:
      'Home answers, reaching and pegs agree. The hand lies above the line, without pain, and 96 of 100 letters can be read. This way of holding the hand works for her.',
    plan: [
      'block',
      'A short block on long writing days, and words for relatives. The hand position stays hers.',
    ],
  }),
  concludes(6, -272, 'left_settled', 'high', {
    matters: 'Cutting without tearing, and tying her own laces.',
    because:
      'All ten answers, all 21 reaches and the pegs point to the left hand. Class scissors are made for the right hand; with left-handed ones she followed a curve at once.',
    plan: ['block', 'Six sessions; left-handed scissors at school and at home; a footrest.'],
  }),
  concludes(13, -70, 'left_emerging', 'medium', {
    matters: 'Drawing without having to look who is there.',
    because:
      'Home answers, shown actions and reaching point to the left hand. She has been asked to use the right for a year and looks up before she begins. At five a hand may still be settling; everything seen so far goes one way.',
    plan: [
      'block',
      'A block about writing with pleasure. Talk with mother and grandmother about leaving the hand to her.',
    ],
    disagreements:
      'Lids and spreading go to the right hand, which is ordinary for jobs that need two hands. The three early reaches with the right came while she watched her grandmother.',
  }),
  concludes(18, -57, 'left_settled', 'high', {
    matters: 'Cutting what he has drawn without spoiling it.',
    because:
      'Home answers, reaching and pegs point to the left hand. The jagged edges come from the scissors: the blades hide the line from a left-hander and push the paper over.',
    plan: ['block', 'Left-handed scissors on loan, four sessions, advice to school on which pairs to buy.'],
  }),
  concludes(23, -84, 'left_settled', 'medium', {
    matters: 'Labelling his own maps, and getting to the end of a page.',
    because:
      'Home answers and pegs agree on the left hand, and so does every sheet he has drawn; reaching alone does not say. The page lies almost straight and the hand works from above the line, which takes more effort the longer the text.',
    plan: ['block', 'Six sessions on page and pace. Each household gets the same letter.'],
    disagreements:
      'Reaching came out at 14 of 21 with the left, which is within chance: he hurried and used whichever hand was free. Spreading and lids go to the right hand; both are jobs for two hands.',
  }),
  concludes(27, -190, 'left_settled', 'high', {
    matters: 'Reading his own notes again.',
    because:
      'Home answers, reaching and pegs point to the left hand, steadily since he was two. Letters have become small because the fingers hold the pencil very low.',
    plan: ['block', 'Six sessions on size and grip height.'],
  }),
  concludes(31, -9, 'mixed_steady_by_task', 'medium', {
    matters: 'Not being asked to make up her mind.',
    because:
      'Her mother answers “either” for all ten jobs, which gives a quotient of 0. Watched, each job goes to one hand and the same one each time: five to the left, five to the right. Pegs and dots are as quick with either hand.',
    plan: [
      'advice',
      'A page for family and school that says that this is fine. Second visit for the remaining tasks.',
    ],
    disagreements:
      'Home and observation differ because the form asks which hand can do it and the visit shows which hand does.',
    signed: false,
  }),
]
