import { describe, expect, it } from 'vitest'
import { newPasswordField, passwordLength } from '../../shared/passwordRules.ts'

const accepted = (value: string) => newPasswordField.isValid(value, { strict: true })

// 15 to 128 code points, any character, no composition rule: OWASP ASVS 5 requirements 6.2.1, 6.2.5, 6.2.9, 6.2.10.
describe('newPasswordField', () => {
  it.each([
    ['14 characters', 'a'.repeat(14), false],
    ['15 characters', 'a'.repeat(15), true],
    ['15 with spaces and an emoji', 'two red kites 🪁', true],
    ['14 code points that are 15 UTF-16 units', `${'a'.repeat(13)}🪁`, false],
    ['20 lower-case letters', 'abcdefghijklmnopqrst', true],
    ['64 characters', 'é'.repeat(64), true],
    ['128 characters', 'x'.repeat(128), true],
    ['128 emoji', '🪁'.repeat(128), true],
    ['129 characters', 'x'.repeat(129), false],
    ['14 letters and a trailing space: nothing is trimmed', `${'a'.repeat(14)} `, true],
    ['nothing', '', false],
  ])('%s', async (_what, value, expected) => {
    expect(await accepted(value)).toBe(expected)
  })

  it('counts an accent typed as its own character like the composed letter', () => {
    expect(passwordLength('e\u0301'.repeat(15))).toBe(15)
    expect(passwordLength('é'.repeat(15))).toBe(15)
  })

  it('says how long the password is when it is too short or too long', async () => {
    await expect(newPasswordField.validate('short')).rejects.toThrow('at least 15 characters: this has 5')
    await expect(newPasswordField.validate('x'.repeat(200))).rejects.toThrow(
      'at most 128 characters: this has 200',
    )
  })
})
