import { publishedForms, type StartForm } from './1764580000000-publishedForms.ts'

/** What stands beside an activity that can hurt; for the child who shows it as for the adult who tries it at home. */
const cautionOf: Partial<Record<string, string>> = {
  scissors:
    'If the child shows it: round-ended scissors, the child seated, an adult beside. Put a left-handed and a right-handed pair equally near.',
  spreads: 'If the child shows it: a blunt knife and dough or soft food only, with an adult watching.',
}

/** The clinic's own form. */
const handUse: StartForm = {
  key: 'hand-use-10',
  edition: 1,
  definition: {
    title: 'Hand use in ten everyday activities',
    purpose: 'Which hand the child chooses for everyday activities, and how steadily.',
    scoring: 'edinburgh_style',
    items: [
      ['draws_writes', 'Draws or writes', 'Draw me something you like.'],
      ['throws', 'Throws a small ball', 'Throw this soft ball to me.'],
      ['scissors', 'Cuts paper with child-safe scissors', 'Cut along this paper.'],
      ['toothbrush', 'Brushes teeth', 'Show me how you brush your teeth.'],
      ['spoon', 'Eats with a spoon', 'Show me how you eat with a spoon.'],
      ['spreads', 'Spreads or cuts soft food with a table knife', 'Spread this dough for me.'],
      ['unscrews_lid', 'Unscrews a lid: which hand turns', 'Open this jar. What is inside?'],
      ['picks_up', 'Picks up something small', 'Pick up one of these beads.'],
      ['eraser', 'Rubs out with an eraser', 'Rub out this line.'],
      ['taps_screen', 'Taps a touch screen', 'Tap the picture on the screen.'],
    ].map(([id = '', label = '', childLabel = null]) => ({
      id,
      label,
      childLabel,
      caution: cautionOf[id] ?? null,
    })),
    options: ['strong_left', 'left', 'either', 'right', 'strong_right', 'does_not_do'],
    informants: ['guardian', 'teacher', 'child_demonstrated', 'therapist'],
    citation:
      'Edinburgh-style questionnaire: quotient after Oldfield 1971, Neuropsychologia 9:97-113. Activities and wording ' +
      'are this clinic’s own and made safe for children; no child norms are claimed.',
    cautions: ['Not a diagnosis. No norms for children are claimed.'],
    cutOffSet: null,
  },
}

/** Frozen with the migration: a changed wording is a new edition, put in by a later migration or by the clinic lead. */
export const formsOfTheStart: readonly StartForm[] = [handUse, ...publishedForms]
