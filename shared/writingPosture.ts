/*
 * What is known of grip, wrist, paper and seat, in sentences that pages and reports share. Nothing here scores a child: a
 * grip is never wrong, and a posture is offered, not corrected.
 */

/** Per cent using a mature grip in the youngest and the oldest group of 320 children, 3;0 to 6;11. Schneck & Henderson 1990, Am J Occup Ther 44:893-900 (abstract). */
export const matureGripPercent = { youngest: 48, oldest: 90 } as const

/** Left-handed writers whose hand is above the line, of 5,910 pupils. Peters & Pedersen 1978, Neuropsychologia 16:743-746 (abstract). */
export const aboveLinePercent = {
  allGrades: { boys: 40, girls: 29 },
  grades5to6: { boys: 59, girls: 43 },
} as const

export const gripStatements = {
  equal:
    'Dynamic and lateral, tripod and quadrupod: these four grips are equally quick and readable (99 fourth-graders, Koziatek & Powell 2003; 120, Schwellnus et al. 2012). None of them is changed for its look.',
  growing: `About ${matureGripPercent.youngest} % of the youngest group and ${matureGripPercent.oldest} % of the oldest used a mature grip (320 children from 3;0 to 6;11, Schneck & Henderson 1990).`,
  never: 'A grip is written down, never marked as wrong.',
  thumb:
    'Grips with the thumb wrapped over press harder (74 children, Schwellnus et al. 2013): ask about tiredness and pain.',
} as const

export const wristStatements = {
  ordinary: `Writing with the hand above the line is ordinary: ${aboveLinePercent.allGrades.boys} % of left-handed boys and ${aboveLinePercent.allGrades.girls} % of girls did so, and more in later grades (5,910 pupils, Peters & Pedersen 1978).`,
  contested:
    'Whether it matters is disputed: one study found no harm and equal quality with somewhat slower joined writing; teaching guides call it avoidable. The hand follows the angle of the page (Szeligo et al. 2003).',
  offered: 'Another posture is offered, starting with the paper. It is not corrected.',
} as const

/** Degrees the page is turned clockwise for a left-hander, and where the pencil is held above its tip in cm. */
export const paperTurn = { from: 20, usual: 30, to: 45 } as const
export const holdAboveTipCm = { from: 2.5, to: 4 } as const

export const paperStatements = {
  turn: `For the left hand the page lies left of the body’s middle and is turned clockwise, the top right corner nearer the child: about ${paperTurn.usual}°, ${paperTurn.from} to ${paperTurn.to}° by the child’s comfort. Guides differ and no trial was found.`,
  hold: `Holding the pencil about ${holdAboveTipCm.from} to ${holdAboveTipCm.to} cm above the tip keeps the letters in sight (practice leaflets).`,
  seat: 'The writing arm goes to the free side: a left-hander at the left end of a shared table, as the child facing the board sees it. One leaflet prints the reverse; the geometry decides.',
} as const
