/*
 * What counts as "now" in queries. Every hold, link and consent begins with its first moment and is over at its last
 * one, so that nobody is let in for the moment in which something ends.
 */

/** A hold of a therapist or teacher, or a carer's link: begun, and not ended. `row` is the alias, `at` a parameter. */
export const runsAt = (row: string, at = ':now'): string =>
  `${row}.startedAt <= ${at} AND (${row}.endedAt IS NULL OR ${row}.endedAt > ${at})`

/** A row of `consents` that was given, has not run out and was not withdrawn; says the same as `isConsentInForce`. */
export const consentHolds = (row: string, at = ':now'): string =>
  `${row}.kind = 'given' AND ${row}.at <= ${at} AND (${row}.expiresAt IS NULL OR ${row}.expiresAt > ${at})
    AND NOT EXISTS (SELECT 1 FROM consents ${row}w WHERE ${row}w.withdrawsId = ${row}.id AND ${row}w.at <= ${at})`

/** Has the carer in `g` agreed to letters by e-mail in this way? The consent is theirs alone. */
export const emailConsent = (purpose: 'email_link' | 'email_attachment'): string =>
  `EXISTS (SELECT 1 FROM consents f WHERE f.guardianId = g.id AND f.purpose = '${purpose}' AND ${consentHolds('f')})`
