export interface Sentence {
  /** Position in the text, for marking what was found. */
  start: number
  end: number
  text: string
}

const splitter = new Intl.Segmenter('en-GB', { granularity: 'sentence' })

/** Full stops that shorten a word and do not end a sentence. */
const shortForm = /(?:^|[\s(])(?:Dr|Mr|Mrs|Ms|Prof|St|No|e\.g|i\.e|approx|incl|tel|ext)\.\s*$/i

/**
 * Sentences of a letter with their positions. A line break ends a sentence (headings and list items have no full
 * stop), unless the next line plainly carries on in lower case, as in text pasted with hard line ends.
 */
export function sentencesOf(text: string): Sentence[] {
  // Same length as `text`, so that positions hold.
  const joined = text.replace(/(?<![.!?:;\n])\n(?=\p{Ll})/gu, ' ')
  const sentences: Sentence[] = []
  let start = 0
  for (const { segment, index } of splitter.segment(joined)) {
    const end = index + segment.length
    if (shortForm.test(joined.slice(start, end)) && end < joined.length) continue
    const raw = joined.slice(start, end)
    const words = raw.trim()
    const from = start + raw.length - raw.trimStart().length
    if (/[\p{L}\p{N}]/u.test(words)) sentences.push({ start: from, end: from + words.length, text: words })
    start = end
  }
  return sentences
}
