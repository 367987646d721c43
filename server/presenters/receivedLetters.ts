import type { ReceivedLetter } from '../../shared/letters.ts'
import { letterBlocks } from '../../shared/letterText.ts'
import type { ClinicSettings } from '../../shared/settings.ts'
import type { ReceivedLetterRecord } from '../queries/receivedLetters.ts'

/** The letter for its reader: like the PDF, without headings that nothing follows. */
export const presentReceivedLetter = (
  letter: ReceivedLetterRecord,
  clinic: ClinicSettings,
): ReceivedLetter => ({
  id: letter.id,
  childId: letter.childId,
  childName: letter.childName,
  kind: letter.kind,
  sentAt: letter.sentAt.toISOString(),
  author: letter.author,
  clinic: { name: clinic.clinicName, address: clinic.clinicAddress, phone: clinic.clinicPhone },
  salutation: letter.content.salutation,
  sections: letter.content.sections
    .filter((section) => letterBlocks(section.text).length > 0)
    .map(({ id, heading, text }) => ({ id, heading, text })),
})
