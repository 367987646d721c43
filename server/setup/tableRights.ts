/**
 * Tables whose rows the running server may change. Every other row is written once and stays as it is: audit entries,
 * consents, revisions, signatures, addenda, approved letters, answers of teachers and changes of state.
 */
export const updatableTables: readonly string[] = [
  'users',
  'user_sessions',
  'user_tokens',
  'known_devices',
  'throttles',
  'schools',
  'school_classes',
  'class_teachers',
  'children',
  'record_numbers',
  'guardians',
  'referrals',
  'episodes',
  'assignments',
  'alerts',
  'tasks',
  'questionnaire_responses',
  'session_notes',
  'samples',
  'goals',
  'letters',
  'letter_deliveries',
  'outbox_messages',
  'school_advice',
  'clinic_settings',
  'audit_heads',
]

/** Tables whose rows the running server may delete: a questionnaire that was begun and never locked. */
export const deletableTables: readonly string[] = ['questionnaire_responses']
