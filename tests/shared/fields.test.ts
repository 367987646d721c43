import { describe, expect, it } from 'vitest'
import { body, email, isOneMailbox, optionalText, text } from '../../shared/fields.ts'

/*
 * What may reach a mail server as one recipient. The hostile ones are the usual tricks of header and envelope
 * injection (OWASP: lists, display names, line breaks, quoting, comments, routes); trade knowledge, no single source.
 */
const hostile = [
  'a@x.example, b@y.example',
  'a@x.example;b@y.example',
  'a@x.example b@y.example',
  'a@x.example\r\nBcc: b@y.example',
  'a@x.example\nb@y.example',
  'a@x.example\rb@y.example',
  'a@x.example%0ABcc:b@y.example\n',
  '\na@x.example',
  'a@x.example\u0000',
  'a\u0000@x.example',
  'A Name <a@x.example>',
  '<a@x.example>',
  '"a b"@x.example',
  '"a@x.example"@y.example',
  '"@y.example',
  'a"b@x.example',
  "a'b@x.example",
  'a(comment)@x.example',
  'a@x.example(comment)',
  'a@(comment)x.example',
  '@relay.example:a@x.example',
  'a@b@x.example',
  'a@@x.example',
  'a@',
  '@x.example',
  'a',
  'a@localhost',
  'a@x',
  'a@x..example',
  'a..b@x.example',
  '.a@x.example',
  'a.@x.example',
  'a@-x.example',
  'a@x-.example',
  'a@[127.0.0.1]',
  'a@127.0.0.1',
  'a\\@x.example',
  'a@x.example\\',
  'a@x.example\u2028b@y.example',
  'a\u202e@x.example',
  'a@exam\u00adple.example',
  `${'a'.repeat(65)}@x.example`,
  `a@${'x'.repeat(64)}.example`,
  `a@${'x.'.repeat(130)}example`,
  'mailto:a@x.example',
  'a|b@x.example',
  'a`b@x.example',
  'a{b}@x.example',
]

describe('an e-mail address', () => {
  it.each(hostile.map((address) => [JSON.stringify(address), address]))(
    'is refused: %s',
    (_shown, address) => {
      expect(isOneMailbox(address)).toBe(false)
    },
  )

  it.each([
    'name@example.org',
    'first.last+letters@mail.harrowmere.example',
    'x_1%y-z@sub.a-b.example',
    `${'a'.repeat(64)}@x.example`,
  ])('is taken: %s', (address) => {
    expect(isOneMailbox(address)).toBe(true)
  })

  it('says what to write instead, and drops blanks around it', async () => {
    const schema = body({ email: email() })
    await expect(schema.validate({ email: 'a@x.example, b@y.example' })).rejects.toThrow(/one e-mail address/)
    expect(schema.cast({ email: '  name@example.org ' })).toEqual({ email: 'name@example.org' })
  })
})

describe('a text', () => {
  const schema = body({
    text: text('The text', { min: 2, max: 5 }),
    note: optionalText('The note', { max: 3 }),
  })
  const check = (given: object) => schema.validate({ text: 'abc', note: null, ...given }, { strict: true })

  it.each([
    ['NUL', 'a\u0000b'],
    ['a bell', 'a\u0007b'],
    ['half a surrogate pair', 'a\ud83db'],
    ['blanks only', '   '],
    ['nothing', ''],
    ['one character', 'a'],
    ['six characters', 'abcdef'],
    ['a number', 12345],
    ['a list', ['abc']],
  ])('is refused with %s', async (_what, given) => {
    await expect(check({ text: given })).rejects.toThrow()
  })

  it.each([
    ['emoji, each counted once', '👩‍🏫ab'.slice(0, 5)],
    ['right-to-left letters', 'درود'],
    ['combining marks', 'e\u0301a'],
    ['a line break and a tab', 'a\n\tb'],
  ])('is kept with %s', async (_what, given) => {
    await expect(check({ text: given })).resolves.toMatchObject({ text: given })
  })

  it('turns line endings into one kind, and an empty optional one into null', () => {
    expect(schema.cast({ text: ' a\r\nb ', note: '' })).toEqual({ text: 'a\nb', note: null })
  })

  it('comes with no field that is not known', async () => {
    await expect(check({ role: 'administrator' })).rejects.toThrow(/role/)
  })
})
