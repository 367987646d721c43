import { string } from 'yup'

/** Counted in code points after NFKC, the form in which a password is hashed. Nothing is trimmed. */
export const minimumPasswordLength = 15
export const maximumPasswordLength = 128

/** Length of a password as the rules count it: an emoji is one, a letter with its accent is one. */
export const passwordLength = (password: string): number => [...password.normalize('NFKC')].length

/** A new password: length only, any characters, no composition rule. The server adds the check against known lists. */
export const newPasswordField = string()
  .required('Enter a new password')
  .test('length', (value, context) => {
    if (value === '') return true
    const length = passwordLength(value)
    if (length < minimumPasswordLength) {
      const message = `Use at least ${minimumPasswordLength} characters: this has ${length}. Several words together are easy to remember.`
      return context.createError({ message })
    }
    if (length > maximumPasswordLength) {
      const message = `Use at most ${maximumPasswordLength} characters: this has ${length}.`
      return context.createError({ message })
    }
    return true
  })
