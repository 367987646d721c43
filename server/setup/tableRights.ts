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
  'questionnaire_forms',
  'questionnaire_responses',
  'answer_requests',
  'histories',
  'measures',
  'conclusions',
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

/** Tables whose rows the running server may delete: what was begun and never locked, sent or signed. */
export const deletableTables: readonly string[] = [
  'questionnaire_responses',
  'histories',
  'measures',
  'conclusions',
]
