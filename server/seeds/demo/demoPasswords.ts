import { seededRandom } from '../seededRandom.ts'

const words = [
  ...['petal', 'window', 'harbour', 'lantern', 'meadow', 'kettle', 'pebble', 'willow', 'cotton', 'saddle'],
  ...['copper', 'thimble', 'garden', 'marble', 'velvet', 'orchard', 'button', 'candle', 'ribbon', 'walnut'],
  ...[
    'feather',
    'puddle',
    'barley',
    'mitten',
    'cobble',
    'lavender',
    'pocket',
    'clover',
    'drizzle',
    'hammock',
  ],
]

/**
 * The password of a demo account: three plain words and 'demo', so that nobody takes it for a real one. The same for
 * the same person each time; demo accounts exist on this machine only.
 */
export function demoPassword(person: string): string {
  const seed = [...person].reduce((sum, character) => (sum * 31 + (character.codePointAt(0) ?? 0)) >>> 0, 7)
  return `${seededRandom(seed).shuffled(words).slice(0, 3).join('-')}-demo`
}
