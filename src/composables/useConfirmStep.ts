import { readonly, shallowRef } from 'vue'

export interface ConfirmStep {
  title: string
  /** What will happen, and what cannot be undone. */
  text: string
  /** The word on the button that does it, e.g. 'Sign the note'. */
  action: string
  /** The word on the button that does not; 'Cancel' when left out. */
  keep?: string
  danger?: boolean
}

const asked = shallowRef<(ConfirmStep & { answer: (yes: boolean) => void }) | null>(null)

/** What the one ConfirmDialog of the shell shows. */
export const askedStep = readonly(asked)

export function answerStep(yes: boolean): void {
  const step = asked.value
  asked.value = null
  step?.answer(yes)
}

/** Asks before something that cannot be taken back: `if (await confirm({ … })) …`. */
export function useConfirmStep() {
  return (step: ConfirmStep): Promise<boolean> => {
    // A second question replaces the first, which counts as answered with no.
    answerStep(false)
    return new Promise((answer) => {
      asked.value = { ...step, answer }
    })
  }
}
