import { randomInt } from 'node:crypto'
import { it } from 'vitest'
import { addDays, dayOf } from '../../shared/days.ts'
import {
  approveLetter,
  askForApproval,
  giveBack,
  openFromCaseload,
  writeWholeLetter,
} from './steps/colleague.ts'
import { acceptInvitation, inviteCarer } from './steps/invitation.ts'
import { readLetter, seeLetterRead, sendLetter, writeLetter } from './steps/letter.ts'
import { writeNote } from './steps/note.ts'
import { fillQuestionnaire } from './steps/questionnaire.ts'
import { describeChild, findChild, observeWriting, seeOnCaseload, setGoal } from './steps/record.ts'
import { acceptReferral, enterReferral, type NewChild } from './steps/referral.ts'
import { openEveryFigure } from './steps/review.ts'
import { addSamples } from './steps/sample.ts'
import { answerAdvice, giveAdvice, seeAnswer, stopSharing } from './steps/school.ts'
import { inspect, signOut } from './support/browser.ts'
import { seeText } from './support/fields.ts'
import { signInOf } from './support/people.ts'
import { openStage } from './support/stage.ts'

const { inboxUrl, enter, arrive, expectNoFaults } = openStage()

// Another child each time, so that the test can be run again on a clinic that is kept.
const marker = randomInt(100_000, 999_999)
const child: NewChild = {
  givenName: 'Ilse',
  familyName: `Farrant-${marker}`,
  born: { day: String(randomInt(1, 28)), month: String(randomInt(1, 11)), year: '2018' },
  carer: { name: 'Wilma Farrant', email: `wilma.farrant.${marker}@harrowmere.example` },
}
const carersPassword = 'thunder-pencil-orchid-boat'

it('takes a left-handed child from the referral to a letter that is read, as five roles in turn', async () => {
  const today = dayOf(new Date(), 'Europe/London')

  const administrator = await arrive('administrator', signInOf('pauline'))
  await enterReferral(administrator, child)
  const lead = await arrive('lead', signInOf('ines'))
  await acceptReferral(lead, child, 'Adaeze Nwosu-Reid')
  const { link } = await inviteCarer(lead, child, inboxUrl)
  const carer = await enter('carer', 390, 844)
  await acceptInvitation(carer, link, child, carersPassword)

  const therapist = await arrive('therapist', signInOf('adaeze'))
  await findChild(therapist, child)
  await describeChild(therapist, addDays(today, 84))
  await fillQuestionnaire(therapist)
  await setGoal(therapist, addDays(today, 84))
  await writeNote(therapist)
  await observeWriting(therapist)
  await addSamples(therapist, { earlier: addDays(today, -7), today })
  await giveAdvice(therapist)

  await writeLetter(therapist, child)
  await signOut(carer)
  await readLetter(carer, await sendLetter(therapist, child, inboxUrl), child, carersPassword)
  await seeLetterRead(therapist)

  const teacher = await arrive('teacher', signInOf('kwabena'))
  const pupilAddress = await answerAdvice(teacher, child)
  await seeAnswer(therapist)
  await seeOnCaseload(therapist, child)
  await openEveryFigure(lead)
  await stopSharing(carer, teacher, child, pupilAddress)

  expectNoFaults()
})

it('lets a newly qualified therapist’s letter go only when the lead has approved it', async () => {
  const colleague = await arrive('newly qualified therapist', signInOf('rohan'))
  await openFromCaseload(colleague, 'Kofi Adjarey')
  await writeWholeLetter(colleague)
  await askForApproval(colleague)
  await inspect(colleague, 'letter-waiting-for-approval')

  const lead = await arrive('lead', signInOf('ines'))
  const words = 'The strengths come first, well done. Say in one line when you meet next.'
  await giveBack(lead, 'Adjarey', words)
  const { page } = colleague
  await page.reload()
  await seeText(page, words)
  await inspect(colleague, 'letter-given-back')
  await page.getByLabel(/^Next visit/).fill(addDays(dayOf(new Date(), 'Europe/London'), 14))
  await seeText(page, /^Saved \d\d:\d\d$/)
  await askForApproval(colleague)

  await lead.page.reload()
  await approveLetter(lead)
  await inspect(lead, 'letter-approved-by-lead')
  await page.reload()
  await page.getByRole('button', { name: 'Send', exact: true }).waitFor()
  expectNoFaults()
})
