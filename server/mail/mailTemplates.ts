import { layOutMail, oneLine, type MailClinic, type MailContent } from './mailLayout.ts'

/*
 * E-mail is read over shoulders, on shared phones and by the wrong person. No template takes a child's name, so none can
 * print one, and none says what the clinic does for whom.
 */

interface WithLink {
  clinic: MailClinic
  link: string
}

interface Invitation extends WithLink {
  /** How long the link works, in words, e.g. '7 days'. */
  worksFor: string
}

const notExpected = (clinic: MailClinic) =>
  `If you did not expect this e-mail, please call us on ${oneLine(clinic.clinicPhone)} and do not use the link.`

/** To a carer: a letter can be read after signing in. */
export const letterNotice = ({ clinic, link, worksFor }: Invitation): MailContent =>
  layOutMail(clinic, `You have a letter from ${clinic.clinicName}`, [
    'Hello,',
    'We have written to you. To keep what we write private, the letter is not in this e-mail. Please sign in to read it.',
    { label: 'Read the letter', link },
    `The link works for ${worksFor}. After that you can still sign in and find the letter there.`,
    notExpected(clinic),
  ])

/** To a carer who asked for letters as attachments. */
export const letterAttached = ({ clinic }: { clinic: MailClinic }): MailContent =>
  layOutMail(clinic, `A letter from ${clinic.clinicName} is attached`, [
    'Hello,',
    'Our letter to you is attached as a PDF file. You asked us to send letters this way. You can change this at any time: sign in, or call us.',
    'Please keep the file where only you can open it.',
    `If this letter is not meant for you, please delete it and call us on ${oneLine(clinic.clinicPhone)}.`,
  ])

/** To a new colleague: choose a password and begin. */
export const staffInvitation = ({
  clinic,
  link,
  worksFor,
  name,
}: Invitation & { name: string }): MailContent =>
  layOutMail(clinic, `Your sign-in for ${clinic.clinicName}`, [
    `Hello ${oneLine(name)},`,
    'An account has been made for you. Choose your password to begin.',
    { label: 'Choose a password', link },
    `The link works once, for ${worksFor}. Do not pass it on.`,
    notExpected(clinic),
  ])

/** To a carer: an account to read letters and answer questions with. */
export const carerInvitation = ({ clinic, link, worksFor }: Invitation): MailContent =>
  layOutMail(clinic, `An invitation from ${clinic.clinicName}`, [
    'Hello,',
    'We would like to share letters with you safely. Choose a password, and you can read them after signing in. It takes about two minutes.',
    { label: 'Choose a password', link },
    `The link is only for you. It works once, for ${worksFor}.`,
    notExpected(clinic),
  ])

/** To whoever asked for a new password. */
export const passwordReset = ({ clinic, link, worksFor }: Invitation): MailContent =>
  layOutMail(clinic, 'Choose a new password', [
    'Hello,',
    'Somebody asked for a new password for this e-mail address. If it was you, choose one here.',
    { label: 'Choose a new password', link },
    `The link works once, for ${worksFor}.`,
    'If it was not you, you need not do anything. Your password stays as it is.',
  ])

/** To the owner of an account, after every change of its password. No link: there is nothing to press by mistake. */
export const passwordChanged = ({
  clinic,
  changedAt,
}: {
  clinic: MailClinic
  changedAt: string
}): MailContent =>
  layOutMail(clinic, 'Your password was changed', [
    'Hello,',
    `Your password was changed on ${changedAt}. Wherever you were signed in, you have been signed out.`,
    `If this was not you, please call us on ${oneLine(clinic.clinicPhone)} at once.`,
  ])

export type DeliveryProblem = 'refused' | 'gave_up'

const problemWords: Record<DeliveryProblem, string> = {
  refused: 'The receiving mail server refused it: the address may be wrong, or the mailbox closed or full.',
  gave_up: 'The receiving mail server could not be reached for five days, so we stopped trying.',
}

/** To the author of a letter that did not arrive. Who it was for is said only after signing in. */
export const deliveryFailed = ({
  clinic,
  link,
  problem,
}: WithLink & { problem: DeliveryProblem }): MailContent =>
  layOutMail(clinic, 'An e-mail could not be delivered', [
    'Hello,',
    `One of your letters could not be delivered. ${problemWords[problem]}`,
    'Please check the address today, and call the family if you can.',
    { label: 'Open the letter', link },
  ])
