import { expect, it } from 'vitest'
import {
  askCarer,
  openLink,
  openProfile,
  requestLink,
  seeNothingShown,
  seeRequest,
  tapAnswer,
  withdraw,
} from './steps/answers.ts'
import { inspect, openTab, settled, signOut } from './support/browser.ts'
import { press, seeHeading, seeText } from './support/fields.ts'
import { mailTo, waitForLink } from './support/inbox.ts'
import { addChild, inviteMother, type FreshChild } from './support/newChild.ts'
import { signInOf, signInOfParent } from './support/people.ts'
import { openStage } from './support/stage.ts'

const { inboxUrl, enter, arrive, expectNoFaults } = openStage()

const fourTasks = 'Four tasks, short form'
const sevenTasks = 'Seven tasks'
const answerLink = /http\S+\/answer#\S+/

/** Asks the father, who has no account; gives the link of the newest e-mail, which names nobody. */
const linkFor = async (child: FreshChild): Promise<string> => {
  const { message, link } = await waitForLink(inboxUrl, child.father.email, answerLink)
  for (const name of child.name.split(' ')) expect(JSON.stringify(message)).not.toContain(name)
  return link
}

it('opens a link with the birth date for a father without an account, once, and shows nothing after that', async () => {
  const lead = await arrive('lead', signInOf('ines'))
  const child = await addChild(lead, { therapist: 'Adaeze Nwosu-Reid', givenName: 'Bronwen' })
  const therapist = await arrive('therapist', signInOf('adaeze'))
  await openProfile(therapist, child)
  await askCarer(therapist, { carer: child.father.name, form: fourTasks, byLink: true })
  const link = await linkFor(child)

  const father = await enter('father', 360, 780, true)
  const { page } = father
  const [day, month, year] = child.born
  const tap = (name: string) => page.getByRole('button', { name, exact: true }).tap()
  await page.goto(link)
  await seeHeading(page, 'Questions for you')
  // The secret leaves the address at once.
  expect(new URL(page.url()).hash).toBe('')
  await inspect(father, 'link-before')
  await openLink(father, [day, month, String(Number(year) - 1)])
  await seeNothingShown(father, child, 'link-wrong-birth-date')

  await openLink(father, child.born)
  await seeHeading(page, 'Before you begin')
  await inspect(father, 'link-opened')
  await tap('Begin')
  for (const place of [1, 2, 3, 4]) await tapAnswer(father, `${place} of 4`, 'Left, always')
  await tap('Next')
  await tap('Send my answers')
  await seeHeading(page, 'Thank you: your answers have arrived')
  await inspect(father, 'link-sent')
  await openProfile(therapist, child)
  await seeRequest(therapist, fourTasks, 'Answered')

  await page.goto('about:blank')
  await page.goto(link)
  await openLink(father, child.born)
  await seeNothingShown(father, child, 'link-used')
  expectNoFaults()
})

it('shows nothing through a link that was withdrawn or meant for somebody else, and sends no second one the same day', async () => {
  const lead = await arrive('lead', signInOf('ines'))
  const child = await addChild(lead, { therapist: 'Adaeze Nwosu-Reid', givenName: 'Bronwen' })
  const therapist = await arrive('therapist', signInOf('adaeze'))
  await openProfile(therapist, child)
  await askCarer(therapist, { carer: child.father.name, form: fourTasks, byLink: true })
  const link = await linkFor(child)

  // Another family uses this computer: the link says who is signed in, and gives away nothing.
  const other = await arrive('another parent', signInOfParent('faridHaidari'))
  const tab = await openTab(other)
  await tab.page.goto(link)
  await seeText(tab.page, /Farid Haidari is signed in in this browser/)
  await inspect(tab, 'link-somebody-else')
  await openLink(tab, child.born)
  await seeNothingShown(tab, child, 'link-somebody-else-refused')
  await signOut(other)
  await tab.page.goto('about:blank')
  await tab.page.goto(link)
  await openLink(tab, child.born)
  await seeHeading(tab.page, 'Before you begin')

  // A reminder on the same day is refused in kind words: the link of the first e-mail goes on working.
  const before = (await mailTo(inboxUrl, child.father.email)).length
  await therapist.page.getByRole('button', { name: /^Send a reminder/ }).click()
  await seeText(therapist.page, /less than a day ago.*give them a day/)
  await inspect(therapist, 'reminded-too-soon')
  expect((await mailTo(inboxUrl, child.father.email)).length).toBe(before)
  const father = await enter('father', 360, 780)
  await father.page.goto(link)
  await openLink(father, child.born)
  await seeHeading(father.page, 'Before you begin')

  // Withdrawn while the questions are open: the next answer is refused in kind words, and they open no more.
  await openProfile(therapist, child)
  await withdraw(therapist, fourTasks)
  await inspect(therapist, 'asked-withdrawn')
  await press(father.page, 'Begin')
  await father.page.getByRole('radio', { name: 'Left, always', exact: true }).check()
  await seeText(father.page.getByRole('status'), /^Not saved: These questions are closed.*call the clinic/)
  await inspect(father, 'link-withdrawn-while-open')
  await father.page.goto('about:blank')
  await father.page.goto(link)
  await openLink(father, child.born)
  await seeNothingShown(father, child, 'link-withdrawn')
  expectNoFaults()
})

it('lets a mother finish on the form she began although the clinic lead has retired it meanwhile', async () => {
  const lead = await arrive('lead', signInOf('ines'))
  const child = await addChild(lead, { therapist: 'Tomasz Zielak', givenName: 'Leocadia' })
  const mother = await inviteMother(lead, child, inboxUrl)
  const therapist = await arrive('therapist', signInOf('tomasz'))
  await openProfile(therapist, child)
  await askCarer(therapist, { carer: child.mother.name, form: sevenTasks, byLink: false })
  const carer = await arrive('carer', mother, 360, 780, true)
  const { page } = carer
  const tap = (name: string) => page.getByRole('button', { name, exact: true }).tap()
  await requestLink(carer, sevenTasks).tap()
  await tap('Begin')
  for (const place of [1, 2, 3]) await tapAnswer(carer, `${place} of 7`, 'Right, mostly')
  await seeText(page, /^Saved/)

  await lead.page.goto(`${lead.url}/forms`)
  await press(lead.page, `Retire ${sevenTasks}`)
  await press(lead.page.getByRole('alertdialog'), 'Retire it')
  await seeText(lead.page, `${sevenTasks}, edition 1: retired.`)
  await inspect(lead, 'form-retired')
  try {
    for (const place of [4, 5, 6, 7]) await tapAnswer(carer, `${place} of 7`, 'Left, always')
    await page.reload()
    await settled(page)
    await page.goto(`${carer.url}/my-child/${child.childId}`)
    await requestLink(carer, sevenTasks).tap()
    await seeHeading(page, 'Look at your answers')
    await tap('Send my answers')
    await seeHeading(page, 'Thank you: your answers have arrived')
  } finally {
    await press(lead.page, `Bring back ${sevenTasks}`)
    await seeText(lead.page, `${sevenTasks}, edition 1: in use again.`)
  }
  await openProfile(therapist, child)
  await seeRequest(therapist, sevenTasks, 'Answered')
  // Three right with one mark, four left with two: 100 (3 − 8) / 11 = −45.5.
  const line = therapist.page.getByRole('region', { name: 'Lateral line', exact: true })
  await seeText(line.locator('summary').filter({ hasText: sevenTasks }), '−45.5')
  expectNoFaults()
})
