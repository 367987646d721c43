import { glyphOf, type Glyph } from './strokeFont.ts'

/*
 * Shapes in the manner of a joined right-to-left script: teeth, bowls, loops, tall strokes and dots on a common
 * baseline. They are pictures of writing, not writing: no word of any language is spelled or misspelled with them.
 * Each shape begins and ends on the baseline, so that shapes of one word join.
 */
const shapes: Glyph[] = [
  ['M 62 4 Q 34 -2 30 34 Q 28 60 34 62 Q 36 20 22 6 Q 10 0 0 4', 'M 32 -34 L 36 -32'],
  ['M 60 4 L 36 4 L 36 168', 'M 36 4 L 0 4'],
  ['M 120 4 Q 104 60 84 66 Q 62 70 62 40 Q 64 12 88 12 Q 112 14 60 2 L 0 4'],
  ['M 118 40 Q 118 -40 66 -42 Q 22 -42 18 18 L 22 34', 'M 66 24 L 70 27'],
  [
    'M 104 4 L 84 6 Q 80 46 76 48 Q 72 8 56 6 Q 50 44 46 48 Q 42 8 26 4 L 0 4',
    'M 52 92 L 56 95 M 72 92 L 76 95',
  ],
  ['M 92 4 L 60 4 Q 22 10 22 44 Q 26 72 56 66 Q 74 60 58 40 Q 30 4 0 4', 'M 44 108 L 48 111'],
  ['M 66 58 Q 70 6 38 -24 Q 20 -40 0 -36'],
  ['M 76 4 L 48 6 Q 44 42 40 44 Q 36 8 20 4 L 0 4', 'M 42 -34 L 46 -31', 'M 60 -34 L 64 -31'],
].map((strokes) => glyphOf(strokes.flatMap((stroke) => stroke.split(/ (?=M )/))))

/** A shape for each letter of the model text; which one is decided by the letter, so that words look like words. */
export function shapeFor(character: string): Glyph {
  const shape = shapes[(character.codePointAt(0) ?? 0) % shapes.length]
  if (!shape) throw new Error('There are no shapes')
  return shape
}
