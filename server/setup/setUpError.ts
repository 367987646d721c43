/** A fault the person at the keyboard can mend. Its message is the whole of what is printed: no stack. */
export class SetUpError extends Error {
  override name = 'SetUpError'
}
