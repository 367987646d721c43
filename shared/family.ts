import type { ConsentPurpose } from './consents.ts'
import type { Day } from './days.ts'
import type { ReceivedLetterRow } from './letters.ts'
import type { OwnContact } from './guardians.ts'

/** A child as a parent or carer sees them. */
export interface MyChildRow {
  id: string
  name: string
  therapist: string | null
  unreadLetters: number
}

export interface MyConsent {
  purpose: ConsentPurpose
  label: string
  consequence: string
  inForce: boolean
  /** Set when this carer may withdraw it. */
  consentId: string | null
  givenBy: string | null
  givenAt: string | null
  can: { give: boolean; withdraw: boolean }
}

export interface MyChildView {
  id: string
  name: string
  birthDate: Day
  school: string | null
  therapist: string | null
  clinic: { name: string; phone: string; emergencyText: string }
  letters: ReceivedLetterRow[]
  consents: MyConsent[]
  goals: string[]
  ownContact: OwnContact & { name: string; email: string | null; version: number }
}
