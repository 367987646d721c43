import type { DemoConclusion } from './assessmentTypes.ts'
import { conclusionsBy } from './conclusionParts.ts'

const concludes = conclusionsBy('rohan')

/** By a newly qualified therapist: the lead signs them too. The last one still waits for that. */
export const conclusionsRohan: readonly DemoConclusion[] = [
  concludes(16, -107, 'left_settled', 'high', {
    matters: 'Room for his elbow.',
    because:
      'Home answers, reaching and pegs point to the left hand. Chair, neighbour and page leave the writing arm no place.',
    plan: ['block', 'Seat and page first, then six sessions on size and line.'],
    countersigned: { day: -104, by: 'ines' },
  }),
  concludes(3, -87, 'left_settled', 'high', {
    matters: 'Writing about bridges without his hand getting hot.',
    because:
      'Home answers on two forms, reaching and pegs agree on the left hand. Heavy pressure, a low grip and a high desk go with pain of 4 after ten minutes; the left slows from trial to trial in tapping.',
    plan: [
      'block',
      'Pauses, lower desk and lighter pencil first; no more practice until the pain is down. Letter to the family doctor.',
    ],
    countersigned: { day: -84, by: 'ines' },
  }),
  concludes(21, -81, 'left_settled', 'high', {
    matters: 'Match reports that can be read, and mornings without a rush.',
    because:
      'Home answers, reaching, pegs and tapping point to the left hand. Letters run together when he hurries; laces and buttons have not been shown to him left-handed.',
    plan: ['block', 'Six sessions on spacing, laces and buttons, shown from the left.'],
    countersigned: { day: -78, by: 'ines' },
  }),
  concludes(26, -75, 'left_settled', 'high', {
    matters: 'Getting all of her ideas onto the paper.',
    because:
      'Both home forms, reaching and pegs point to the left hand. Her hand follows the ink, so the work smears and she writes less.',
    plan: ['block', 'Page to the left and turned, quick-drying pen, planning before writing.'],
    countersigned: { day: -72, by: 'ines' },
  }),
  concludes(37, -69, 'left_settled', 'high', {
    matters: 'Finishing what she has to say before the arm says stop.',
    because:
      'Home answers, reaching and pegs point to the left hand. Pain of 6 after ten minutes and a left hand that falls off in tapping: this needs a doctor’s eye before more practice.',
    plan: [
      'medical_review',
      'Family doctor to look at hand and forearm within two weeks; no long writing until then; typing at school.',
    ],
    countersigned: { day: -66, by: 'ines' },
  }),
  concludes(32, -3, 'left_settled', 'medium', {
    matters: 'Being ready for the high school.',
    because:
      'Home answers, reaching, pegs and tapping point to the left hand. Speed is no concern; the page lies straight and the elbow has to stay in, so the line sinks.',
    plan: [
      'advice',
      'Slide and turn of the page, tried at once with good effect; a look in class, then advice only.',
    ],
    disagreements: 'He kicks with the left foot and looks through the right eye, which is ordinary.',
  }),
]
