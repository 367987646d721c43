import type { DemoConclusion } from './assessmentTypes.ts'
import { conclusionsBy } from './conclusionParts.ts'

const concludes = conclusionsBy('mairi')

export const conclusionsMairi: readonly DemoConclusion[] = [
  concludes(4, -105, 'left_settled', 'high', {
    matters: 'Being as quick in English as she is in Dari.',
    because:
      'What she chooses herself goes to the left hand at home, in reaching and with pegs. Eating with the right at family meals is a custom and not counted. Dari runs from right to left and she turns the page for it; the advice for English does not fit it.',
    plan: ['block', 'Six sessions with the interpreter; two page set-ups, one for each script.'],
  }),
  concludes(17, -60, 'left_settled', 'medium', {
    matters: 'Writing letters that others can read without a mirror.',
    because:
      'Home answers, shown actions, reaching and pegs point to the left hand. Turned letters are usual at her age in either hand and say nothing about preference.',
    plan: ['block', 'A short block on where to start each letter; words for school on turned letters.'],
    disagreements:
      'She kicks with the right foot and writes with the left hand. Different sides for hand and foot are ordinary.',
  }),
  concludes(22, -148, 'left_settled', 'high', {
    matters: 'Writing with her feet on something.',
    because:
      'Home answers, reaching and pegs agree on the left hand. Chair and desk are far too large by every measure taken: she leans on the writing arm to stay up.',
    plan: ['block', 'Footrest and a lower desk first, then four sessions at that desk.'],
  }),
  concludes(28, -328, 'left_settled', 'medium', {
    matters: 'Keeping up with her friends at table and in the cloakroom.',
    because:
      'Home answers, reaching and pegs point to the left hand. Movement takes effort in many activities, which has nothing to do with being left-handed.',
    plan: [
      'block',
      'Six sessions on cutlery and laces; her doctor is asked whether coordination should be looked at.',
    ],
  }),
  concludes(34, -80, 'left_settled', 'high', {
    matters: 'Taking notes that are there when he needs them.',
    because:
      'Home answers, the short form, reaching and tapping all point to the left hand. Two scripts are a strength; English notes by hand cost him time.',
    plan: ['block', 'Typing in short sessions, mouse on the left, advice to school.'],
  }),
  concludes(38, -204, 'mixed_steady_by_task', 'medium', {
    matters: 'Knowing which way round to hold a guitar, and being let loose on the wood.',
    because:
      'Writing and eating go to the left hand, throwing and sweeping to the right, the same way each time. Reaching is not beyond chance and the hands are equally quick with pegs. This is steady by task, which is fine.',
    plan: [
      'block',
      'Workshop safety for a left-handed cut, trying the guitar both ways before the first lesson.',
    ],
    disagreements:
      'The home form leans to the left because it asks about writing and table jobs; sport and tools lean to the right. Both are true.',
  }),
]
