import { describe, expect, it } from 'vitest'
import { letterBlocks } from '../../shared/letterText.ts'

describe('letterBlocks', () => {
  it.each([
    ['nothing', '', []],
    ['only white space', ' \n \n', []],
    ['one paragraph', 'One.', [{ kind: 'paragraph', lines: ['One.'] }]],
    [
      'a blank line as a new paragraph',
      'One.\n\n\nTwo.',
      [
        { kind: 'paragraph', lines: ['One.'] },
        { kind: 'paragraph', lines: ['Two.'] },
      ],
    ],
    [
      'a single line break as a line of the same paragraph',
      'One\nTwo',
      [{ kind: 'paragraph', lines: ['One', 'Two'] }],
    ],
    [
      'a list right under its opening line',
      'Two things:\n- one\n- two',
      [
        { kind: 'paragraph', lines: ['Two things:'] },
        { kind: 'list', items: ['one', 'two'] },
      ],
    ],
    [
      'items with blank lines between as one list',
      '- one\n\n- two',
      [{ kind: 'list', items: ['one', 'two'] }],
    ],
    ['a dash inside a line as text', 'a - b', [{ kind: 'paragraph', lines: ['a - b'] }]],
    ['a negative number as text', '-5 is cold', [{ kind: 'paragraph', lines: ['-5 is cold'] }]],
    ['Windows line ends', '- one\r\n- two', [{ kind: 'list', items: ['one', 'two'] }]],
  ])('reads %s', (_what, text, blocks) => {
    expect(letterBlocks(text)).toEqual(blocks)
  })
})
