import { layOutMail, oneLine, type MailClinic, type MailContent } from './mailLayout.ts'

/* Like every template: no child's name, nothing about why the clinic asks (see mailTemplates.ts). */

interface Questions {
  clinic: MailClinic
  link: string
  /** Last day the answers can be sent, in words, e.g. '3 Mar 2026'. */
  answerBy: string
  /** The link opens the questions by itself; otherwise the person signs in. */
  byLink: boolean
}

const howItOpens = ({ byLink, answerBy }: Questions) =>
  byLink
    ? `The link is only for you: please do not pass it on. It works until ${answerBy}, and ends once you have sent your answers.`
    : `Please sign in to answer. The questions stay open until ${answerBy}.`

const blocks = (questions: Questions, opening: string) => [
  'Hello,',
  opening,
  'They take ten to fifteen minutes. Your answers are kept as you go, so you can stop and come back.',
  { label: 'Answer the questions', link: questions.link },
  howItOpens(questions),
  `If you did not expect this e-mail, please call us on ${oneLine(questions.clinic.clinicPhone)} and do not use the link.`,
]

/** To a carer or teacher: the clinic would like to know something. */
export const answersAsked = (questions: Questions): MailContent =>
  layOutMail(
    questions.clinic,
    `A few questions from ${questions.clinic.clinicName}`,
    blocks(questions, 'We have a few questions for you. Your answers help us to prepare.'),
  )

/** To the same person, when no answers came. A link in this e-mail takes the place of the earlier one. */
export const answersReminder = (questions: Questions): MailContent =>
  layOutMail(questions.clinic, `Our questions are still open: ${questions.clinic.clinicName}`, [
    ...blocks(
      questions,
      'Some time ago we sent you a few questions. If you have had no time yet, here they are again.',
    ),
    ...(questions.byLink ? ['Please use this link: the one we sent before no longer opens.'] : []),
  ])
