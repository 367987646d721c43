/** Sentences to copy, in our own words and in letters the stroke font has; long enough for a fast writer. */
const models = {
  young: 'my cat sat on the big red bed and had a nap in the sun the dog ran up and down',
  middle:
    'my dog can jump over the big log and run back home before the rain comes then we sit by the fire and eat hot soup with bread',
  older:
    'on a quiet evening we walk along the river to the old mill where the wheel still turns and my uncle tells us how the flour was made long before the bridge was built and the first lamps were lit in our street',
} as const

export type ModelText = keyof typeof models

const isLetter = (character: string) => /\p{L}/u.test(character)

/** The beginning of a model with so many letters: where the child was when the time was up. */
export function firstLetters(model: ModelText, letters: number): string {
  let text = ''
  let left = letters
  for (const character of models[model]) {
    if (left === 0) break
    text += character
    if (isLetter(character)) left -= 1
  }
  if (left > 0) throw new Error(`The ${model} sentence has fewer than ${letters} letters`)
  return text
}

/** Lower-case letters in a text. */
export const countLetters = (text: string): number => [...text].filter(isLetter).length
