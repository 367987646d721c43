import type { DeliveryState, LetterState } from '@shared/letters.ts'

/** The tone beside the word of a letter's state. */
export const letterTone = (state: LetterState) =>
  (
    ({
      draft: 'pollen',
      awaiting_approval: 'pollen',
      approved: 'petal',
      queued: 'rain',
      sent: 'leaf',
      recalled: 'plain',
    }) as const
  )[state]

/** The tone beside the word of one copy's state. */
export const deliveryTone = (state: DeliveryState) =>
  (
    ({
      queued: 'rain',
      sending: 'rain',
      sent: 'leaf',
      opened: 'leaf',
      failed: 'clay',
      cancelled: 'plain',
    }) as const
  )[state]
