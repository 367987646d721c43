import type { DemoLetter, DemoLetterAct, Offset } from './demoTypes.ts'
import type { StaffKey } from './people.ts'

const approved = (day: Offset, by: StaffKey): DemoLetterAct => ({ act: 'approve', day, by, overrides: [] })

const sent = (
  day: Offset,
  outcome: 'sent' | 'opened' | 'failed' | 'cancelled',
  carers: number[] = [0],
): DemoLetterAct => ({ act: 'send', day, carers, outcome })

const letter = (
  child: number,
  author: StaffKey,
  createdDay: Offset,
  nextVisitDay: Offset | null,
  wording: DemoLetter['wording'],
  acts: DemoLetterAct[],
  changes: Partial<Pick<DemoLetter, 'salutation' | 'firstWording'>> = {},
): DemoLetter => ({
  child,
  author,
  createdDay,
  nextVisitDay,
  wording,
  acts,
  salutation: null,
  firstWording: null,
  ...changes,
})

const noVisitPlanned =
  'No further visit is planned. If you would like to see us again, please call us on 01632 960 140. You need no new referral for twelve months.'

const hamzasHome =
  '- Write the names for one island on his map. About 5 minutes, four days a week.\n- Turn the page a little to the right before he begins. He knows how.'

/** Progress letters. What the record does not hold, such as practice at home, the author has written. */
export const letters: readonly DemoLetter[] = [
  letter(
    1,
    'adaeze',
    -28,
    12,
    {
      home: '- Write four sentences about the day, and read them to someone the next morning. About 5 minutes, four days a week.\n- Turn the page a little to the right and slide it up as it fills.\n- Let Mateo choose the pen that dries quickest.',
    },
    [approved(-27, 'adaeze'), sent(-27, 'opened', [0, 1])],
  ),
  letter(
    4,
    'mairi',
    -38,
    16,
    {
      home: '- Copy a few lines from a recipe in English, with the sheet on her right side. About 3 minutes a day.\n- Write in Dari as you always do. It helps.',
      wrong:
        'You know Soraya best. If we have got something wrong, please tell us. We will put it right and send you a new letter. The interpreter will go through this letter with you. Please call us and we will arrange it.',
    },
    [approved(-37, 'mairi'), sent(-37, 'opened')],
  ),
  letter(
    6,
    'adaeze',
    -43,
    null,
    {
      home: '- Write to your cousin when there is something to tell. About 10 minutes a week.\n- Keep the left-handed scissors in a drawer of their own.',
      next: noVisitPlanned,
    },
    [
      {
        act: 'approve',
        day: -42,
        by: 'adaeze',
        overrides: [
          { phrase: 'no next date', reason: 'Therapy ends here; the letter says how to come back.' },
        ],
      },
      sent(-42, 'opened'),
    ],
  ),
  letter(
    16,
    'rohan',
    -14,
    26,
    {
      home: '- Put a box or stool under his feet at meals and when he draws.\n- One sentence about the day, sitting at the table. About 5 minutes.',
    },
    [{ act: 'submit', day: -13 }, approved(-10, 'ines'), sent(-9, 'cancelled')],
  ),
  letter(
    17,
    'mairi',
    -13,
    28,
    {
      home: '- Write three lines of news for her grandmother. About 5 minutes, three days a week.\n- When a letter is turned round, let Mei-Lin find it herself.',
    },
    [approved(-12, 'mairi'), sent(-12, 'opened')],
  ),
  letter(
    22,
    'mairi',
    -58,
    5,
    {
      home: '- Use the footrest at home too.\n- Sit at a table, not on the sofa, for anything longer than a few words. About 10 minutes at a time.',
    },
    [approved(-57, 'mairi'), sent(-57, 'sent')],
  ),
  letter(23, 'adaeze', -20, 14, { home: hamzasHome }, [approved(-19, 'adaeze'), sent(-19, 'opened', [0])], {
    salutation: 'Dear Nadia Siddiq',
  }),
  letter(23, 'adaeze', -20, 14, { home: hamzasHome }, [approved(-19, 'adaeze'), sent(-19, 'sent', [1])], {
    salutation: 'Dear Daniel Rowe',
  }),
  letter(
    26,
    'rohan',
    -17,
    21,
    {
      home: '- Write what she likes, with the page turned to the right. About 10 minutes, three days a week.\n- Try two quick-drying pens for two weeks each.',
    },
    [{ act: 'submit', day: -15 }, approved(-14, 'ines'), sent(-14, 'sent')],
    {
      firstWording: {
        work: 'Esther was told at her last school that she writes with the wrong hand, and we worked on how messy the page gets.',
      },
    },
  ),
  letter(
    28,
    'mairi',
    -134,
    null,
    {
      home: '- Let her cut her own food, with time for it.\n- Ten minutes of typing practice, three days a week.',
      school: null,
      next: noVisitPlanned,
    },
    [
      {
        act: 'approve',
        day: -133,
        by: 'mairi',
        overrides: [
          {
            phrase: 'no next date',
            reason: 'Discharge agreed with the family; the letter says when to ask again.',
          },
        ],
      },
      sent(-133, 'opened'),
    ],
  ),
  letter(
    37,
    'rohan',
    -17,
    24,
    {
      home: '- Stop for a minute before it hurts, not after.\n- Type anything longer than half a page.\n- Typing practice with both hands, about 10 minutes, four days a week.',
    },
    [{ act: 'submit', day: -17 }, approved(-16, 'ines'), sent(-15, 'failed')],
  ),
  letter(
    40,
    'tomasz',
    -183,
    null,
    // To the young person himself.
    {
      opening:
        'This letter is for you. It says what we did together and how things stand. We sent no copy to anyone at home, as you wished.',
      strengths:
        '- You write computer games.\n- You do what you say you will.\n- You know what works for you.',
      work: 'We worked on answering long test questions in the time you have. You learned to type with both hands.',
      changes: 'You typed 14 words in a minute when we began. Now you type 32.',
      goals:
        'You said: “I know it all and run out of time.”\n- At the start: Most of an answer, nothing checked.\n- Now: A whole answer on the keyboard, checked. This is a little more than we hoped for.',
      home: '- Type in every long test, so that it stays ordinary for you.',
      school: null,
      wrong:
        'If we have got something wrong, please tell us. We will put it right and send you a new letter.',
      next: noVisitPlanned,
    },
    [
      {
        act: 'approve',
        day: -182,
        by: 'tomasz',
        overrides: [
          {
            phrase: 'no next date',
            reason: 'Goals met; he asks for us again himself in the examination year.',
          },
        ],
      },
      sent(-182, 'opened'),
    ],
    { salutation: 'Dear Conrad' },
  ),
  // Waiting for the lead.
  letter(
    3,
    'rohan',
    -4,
    9,
    {
      home: '- Two short pieces about bridges each week. About 5 minutes each. Stop when the hand gets warm.\n- Let him type the long Friday task.',
    },
    [{ act: 'submit', day: -2 }],
  ),
  // Sent back by the lead, to be written again.
  letter(
    21,
    'rohan',
    -16,
    10,
    {
      home: '- One shoe each evening.\n- A match report of three lines. About 5 minutes.\n- Buttons on the big coat.\n- Cutting up fruit.',
      school: null,
    },
    [
      { act: 'submit', day: -15 },
      {
        act: 'return',
        day: -14,
        by: 'ines',
        reason: 'Four things at home are too many for these mornings. Which two matter most to Rafael?',
      },
    ],
  ),
  // Just begun: its prompts are still open.
  letter(18, 'adaeze', -2, 31, {}, []),
]
