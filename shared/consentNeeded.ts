import type { ConsentPurpose } from './consents.ts'

/** Purposes without which something cannot be added to the record. */
export type NeededConsent = Extract<ConsentPurpose, 'assessment_treatment' | 'store_work_samples'>

/** Why something cannot be added now, and what to do; the same words on the page and in a refusal. */
export const consentNeededTexts: Record<NeededConsent, string> = {
  assessment_treatment:
    'No consent for assessment and therapy is in force, so nothing can be added here. What is recorded stays. ' +
    'Ask a person with parental responsibility and record the answer under Family and consent.',
  store_work_samples:
    'No consent for keeping pictures of the child’s work is in force, so none can be added. What is recorded stays. ' +
    'Ask a person with parental responsibility and record the answer under Family and consent.',
}
