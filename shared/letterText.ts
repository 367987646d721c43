/** A letter section's plain text, read: paragraphs and lists are all it can hold. */
export type LetterBlock = { kind: 'paragraph'; lines: string[] } | { kind: 'list'; items: string[] }

/**
 * Reads the plain text of a section: a blank line starts a new paragraph, '- ' a list item. A line that follows
 * another without a blank line stays in the paragraph as a line of its own.
 */
export function letterBlocks(text: string): LetterBlock[] {
  const blocks: LetterBlock[] = []
  let open: LetterBlock | null = null
  for (const line of text.replace(/\r\n?/g, '\n').split('\n')) {
    const content = line.trim()
    if (content === '') {
      // A blank line between two items does not break the list in two.
      if (open?.kind === 'paragraph') open = null
      continue
    }
    const item = /^[-•]\s+(.*)$/.exec(content)?.[1]
    if (item !== undefined) {
      if (open?.kind === 'list') open.items.push(item)
      else blocks.push((open = { kind: 'list', items: [item] }))
    } else if (open?.kind === 'paragraph') open.lines.push(content)
    else blocks.push((open = { kind: 'paragraph', lines: [content] }))
  }
  return blocks
}
