import { describe, expect, it } from 'vitest'
import { adviceItems } from '../../shared/adviceItems.ts'
import { teacherTextProblem } from '../../shared/teacherText.ts'

// The clinic's rules for anything that leaves for a school: no forced change of hand, no blame, no bare score.
describe('teacherTextProblem', () => {
  it.each([
    'The page sits right of the middle, and the arm runs into the body.',
    'Two writing elbows meet at this desk.',
    'Juno writes with the left hand, and the light comes from the left.',
  ])('lets what was seen go out: %s', (text) => {
    expect(teacherTextProblem(text, 'left')).toBeNull()
  })

  it.each([
    [
      'a change of hand',
      'Please move the pencil to the right hand for long texts.',
      /changing a child’s hand/,
    ],
    ['work for the other hand', 'Ask for writing with the right hand on Fridays.', /changing a child’s hand/],
    ['a judging word', 'The writing is messy.', /“messy” cannot go to a school/],
    ['a nickname', 'The lefties sit together.', /“lefties” cannot go to a school/],
    ['a quotient', 'The laterality quotient is −88.', /is a score/],
    ['a goal score', 'The T score was 54.4.', /is a score/],
  ])('holds back %s', (_what, text, message) => {
    expect(teacherTextProblem(text, 'left')).toMatch(message)
  })

  it('does not take a pupil who is still choosing for a left-hander', () => {
    expect(teacherTextProblem('Let him write with the right hand when he picks it.', 'swaps')).toBeNull()
    expect(teacherTextProblem('Let him write with the right hand when he picks it.', null)).toBeNull()
  })

  it('lets every reason of the library go out as it stands', () => {
    expect(adviceItems.filter((item) => teacherTextProblem(item.because, 'left') !== null)).toEqual([])
  })
})
