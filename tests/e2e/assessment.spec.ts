import { expect, it } from 'vitest'
import {
  askCarer,
  enterOn,
  history,
  keyAnswer,
  openProfile,
  requestLink,
  seeRequest,
  tapAnswer,
  tenActivities,
} from './steps/answers.ts'
import { concludeAndSign, countersign, readReport } from './steps/conclusion.ts'
import { openRow, seeRows } from './steps/handProfile.ts'
import { inspect, settled } from './support/browser.ts'
import { answer, seeHeading, seeText } from './support/fields.ts'
import { recordEverything } from './support/handFindings.ts'
import { addChild, inviteMother } from './support/newChild.ts'
import { signInOf } from './support/people.ts'
import { openStage } from './support/stage.ts'

const { inboxUrl, arrive, expectNoFaults } = openStage()

const answers = ['Left, always', 'Left, mostly', 'Either hand', 'Right, mostly', 'Right, always'] as const
const options = [...answers, 'Does not do this yet']

it('lets a mother answer the history on a phone, leave and come back; what alarms is said and on the record at once', async () => {
  const lead = await arrive('lead', signInOf('ines'))
  const child = await addChild(lead, { therapist: 'Mairi Carnathy', givenName: 'Wren' })
  const mother = await inviteMother(lead, child, inboxUrl)
  const therapist = await arrive('therapist', signInOf('mairi'))
  await openProfile(therapist, child)
  await askCarer(therapist, { carer: child.mother.name, form: history, byLink: false })
  await inspect(therapist, 'asked')

  const carer = await arrive('carer', mother, 360, 780, true)
  const { page } = carer
  const tap = (name: string) => page.getByRole('button', { name, exact: true }).tap()
  await seeHeading(page, child.givenName)
  await inspect(carer, 'my-child-to-answer')
  await requestLink(carer, history).tap()
  await seeHeading(page, 'What Wren enjoys')
  await page.getByLabel(/^What does Wren enjoy/).fill('Builds dens and bakes bread with Grandma.')
  await inspect(carer, 'history-first-page')
  await tap('Next')
  await seeHeading(page, 'Which hand')
  await page.getByText('Mostly the same hand', { exact: true }).tap()
  await tap('Next')
  await seeHeading(page, 'Has the hand changed?')
  await answer(page, /^Has Wren changed from mostly/, 'Yes')
  await page.getByRole('group', { name: 'When did that happen?' }).waitFor()
  await seeText(page, /^Saved/)

  // Leaves in the middle, with nothing sent.
  await page.goto(`${carer.url}/my-child/${child.childId}`)
  await seeText(requestLink(carer, history), 'Go on')
  await openProfile(therapist, child)
  await seeRequest(therapist, history, 'Begun')
  await requestLink(carer, history).tap()
  await tap('Go to the end and check')
  const notYet = page.getByRole('listitem')
  await seeText(page, /questions have no answer yet/)
  const open = await notYet.allInnerTexts()
  expect(open).toContain('Is an arm, a leg or one side newly weak?')
  expect(open).not.toContain('What does Wren enjoy and do well?')
  expect(open).not.toContain('How steady is the hand that Wren uses now?')
  await seeText(page, 'Builds dens and bakes bread with Grandma.')
  await inspect(carer, 'history-what-is-open')

  await page.getByRole('button', { name: 'Is an arm, a leg or one side newly weak?', exact: true }).tap()
  await seeHeading(page, 'Anything new?')
  const urgent = page.getByRole('alert')
  expect(await urgent.getByText('Please get help today').count()).toBe(0)
  await answer(page, /^Is an arm, a leg or one side newly weak/, 'Yes')
  await answer(page, /^Are there new headaches/, 'Yes')
  await seeText(urgent, 'Please get help today')
  await seeText(urgent, /new weakness and .*headaches?.* Please get medical help today/)
  await inspect(carer, 'history-urgent')
  await seeText(page, /^Saved/)

  // The therapist finds the sign although nothing was sent.
  await openProfile(therapist, child)
  await seeRequest(therapist, history, 'Begun')
  const signs = therapist.page.getByRole('region', { name: 'Warning signs' })
  await seeText(signs, 'Same-day medical help')
  await seeText(signs, /weakness/i)
  await inspect(therapist, 'profile-with-sign')

  await tap('Go to the end and check')
  await tap('Send to the clinic')
  await seeHeading(page, 'Thank you: your answers have arrived')
  await seeText(page.getByRole('alert'), 'Please get help today')
  await inspect(carer, 'history-sent')
  await openProfile(therapist, child)
  await seeRequest(therapist, history, 'Answered')
  expectNoFaults()
})

it('lets a mother answer a questionnaire on a phone in two goes, and again with the keyboard alone', async () => {
  const lead = await arrive('lead', signInOf('ines'))
  const child = await addChild(lead, { therapist: 'Tomasz Zielak', givenName: 'Idris' })
  const mother = await inviteMother(lead, child, inboxUrl)
  const therapist = await arrive('therapist', signInOf('tomasz'))
  const ask = async () => {
    await openProfile(therapist, child)
    await askCarer(therapist, { carer: child.mother.name, form: tenActivities, byLink: false })
  }
  await ask()

  const carer = await arrive('carer', mother, 360, 780, true)
  const { page } = carer
  const tap = (name: string) => page.getByRole('button', { name, exact: true }).tap()
  await requestLink(carer, tenActivities).tap()
  await seeHeading(page, 'Before you begin')
  await inspect(carer, 'questionnaire-before')
  await tap('Begin')
  for (const place of [1, 2, 3]) await tapAnswer(carer, `${place} of 10`, 'Left, mostly')
  await seeHeading(page, /^4 of 10: /)
  await tap('Leave open for now')
  await tapAnswer(carer, '5 of 10', 'Right, always')
  await seeText(page, /^Saved/)

  await page.goto(`${carer.url}/my-child/${child.childId}`)
  await seeText(requestLink(carer, tenActivities), 'Go on')
  await requestLink(carer, tenActivities).tap()
  // Whoever comes back goes on at the first open activity; the answers given are there.
  await seeHeading(page, /^4 of 10: /)
  await tap('Back')
  await seeHeading(page, /^3 of 10: /)
  expect(await page.getByRole('radio', { name: 'Left, mostly', exact: true }).isChecked()).toBe(true)
  await inspect(carer, 'questionnaire-on-the-phone')
  await tap('Next')
  await tap('Leave open for now')
  await tap('Next')
  for (const place of [6, 7, 8, 9, 10]) await tapAnswer(carer, `${place} of 10`, 'Left, always')
  await tap('Next')
  await seeHeading(page, 'Look at your answers')
  await seeText(page, '1 of 10 not answered yet. You can send them like this.')
  await inspect(carer, 'questionnaire-look-again')
  await tap('Send my answers')
  await seeHeading(page, 'Thank you: your answers have arrived')
  await inspect(carer, 'questionnaire-sent')

  // By hand: L 3 × 1 + 5 × 2 = 13, R 2; 100 (2 − 13) / 15 = −73.3.
  await openProfile(therapist, child)
  await seeRequest(therapist, tenActivities, 'Answered')
  await seeText(therapist.page.getByRole('region', { name: 'Lateral line', exact: true }), '−73.3')

  await ask()
  await page.goto(`${carer.url}/my-child/${child.childId}`)
  await settled(page)
  await enterOn(carer, requestLink(carer, tenActivities))
  await seeHeading(page, 'Before you begin')
  const given = [...answers, ...answers]
  await enterOn(carer, page.getByRole('button', { name: 'Begin', exact: true }))
  for (const [index, words] of given.entries()) await keyAnswer(carer, `${index + 1} of 10`, words, options)
  await enterOn(carer, page.getByRole('button', { name: 'Next', exact: true }))
  await seeHeading(page, 'Look at your answers')
  await enterOn(carer, page.getByRole('button', { name: 'Send my answers', exact: true }))
  await seeHeading(page, 'Thank you: your answers have arrived')
  await openProfile(therapist, child)
  // Every answer twice: the marks of the two hands are the same, so the quotient is 0.
  const row = therapist.page.locator('summary').filter({ hasText: tenActivities }).first()
  await seeText(row, '0.0')
  await seeText(row, '10 of 10 activities answered')
  expectNoFaults()
})

it('shows every measure on the lateral line down to what was seen, and carries it into a countersigned conclusion', async () => {
  const lead = await arrive('lead', signInOf('ines'))
  const child = await addChild(lead, { therapist: 'Rohan Venkadesh', givenName: 'Ottilie' })
  const therapist = await arrive('newly qualified therapist', signInOf('rohan'))
  const expected = await recordEverything(therapist, child)
  await openProfile(therapist, child)
  await inspect(therapist, 'hand-profile-full')
  await seeRows(therapist, expected)

  await openRow(therapist, /^Moving pegs/, ['12.4 s', '14.2 s', /−7\.6/, /Schmidt et al\. 2000/])
  await openRow(therapist, /^Reaching across/, ['Reach 21, place', 'Lost', /17 − 3/, /p \.003/, /Bishop/])
  await openRow(therapist, /^Eye, near/, ['left, left, right', /Bourassa, McManus & Bryden 1996/])
  await openRow(therapist, /Child showed it/, ['Right, mostly', /100 × \(4 − 12\) ÷ \(4 \+ 12\) = −50\.0/])
  await inspect(therapist, 'hand-profile-opened')

  const { page } = therapist
  const together = page.getByRole('region', { name: 'What the measures say together' })
  await seeText(together, /^What was answered points to the left hand and reaching to the right/)
  await seeText(together, /ask whether anyone has pressed for one hand/)
  // Guardian LLLLR twice, child LLLRR twice: they part on two of ten activities, fewer than the three pointed out.
  const informants = page.getByRole('region', { name: 'Who says what' })
  await seeText(informants, /differ on 2 of 10 activities/)
  expect(await informants.getByText('Three or more: ask about them').count()).toBe(0)
  await seeText(page.getByRole('region', { name: 'Then and now' }), /−52\.4.*\+70\.0/)

  const address = await concludeAndSign(therapist)
  await countersign(lead, address)
  const words = await readReport(therapist, child)
  for (const part of ['Rohan Venkadesh', 'Ines Valderrama', 'Reaching across the midline', '+70.0', '−50.0'])
    expect(words).toContain(part)
  expect(words).toMatch(/Oldfield 1971/)
  expectNoFaults()
})
