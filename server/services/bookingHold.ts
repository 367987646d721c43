import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import { conflict } from '../errors.ts'
import { listBookingHolds } from '../queries/alerts.ts'

export interface BookingHold {
  /** What holds a routine block back, in the words on the record. */
  signs: { id: string; text: string }[]
  /** One sentence for the person who wanted to book. */
  message: string
}

/** Why no routine block may be booked for the child now; null when nothing holds it back. */
export const bookingHold = async (access: ChildAccess, tx?: Tx): Promise<BookingHold | null> => {
  const holds = await listBookingHolds(access, tx)
  if (holds.length === 0) return null
  const signs = holds.map(({ id, text }) => ({ id, text }))
  return {
    signs,
    message:
      `A warning sign comes before a routine block: ${signs.map(({ text }) => text).join(' · ')} ` +
      'The child’s therapist or the clinic lead first writes down what was done about it, under “Warning signs”.',
  }
}

/** Refuses (409 `booking_held`) a routine block while a warning sign that holds it back waits for a named person. */
export const requireNoBookingHold = async (tx: Tx, access: ChildAccess): Promise<void> => {
  const hold = await bookingHold(access, tx)
  if (hold) throw conflict('booking_held', hold.message)
}
