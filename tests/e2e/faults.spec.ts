import { expect, it } from 'vitest'
import { approveLetter, openFromCaseload, writeWholeLetter } from './steps/colleague.ts'
import { nextSave, notePart, startNote, writeAndKeep } from './steps/note.ts'
import { inspect, openTab, signInHere, signOut } from './support/browser.ts'
import { answer, choose, openSection, press, seeHeading, seeText } from './support/fields.ts'
import { mailTo, waitForLink } from './support/inbox.ts'
import { signInOf, signInOfParent } from './support/people.ts'
import { openStage } from './support/stage.ts'

const { url, inboxUrl, arrive, expectNoFaults } = openStage()

it('keeps the text of a note on the page when the sign-in has ended, and saves it after signing in again', async () => {
  const how = signInOf('mairi')
  const therapist = await arrive('therapist', how)
  const { page } = therapist
  await openFromCaseload(therapist, 'Soraya Haidari')
  await startNote(therapist)
  await page.context().clearCookies()
  const refused = nextSave(therapist, 401)
  await notePart(therapist, 'Said').fill('Typed after the sign-in had ended.')
  await refused
  const dialog = page.getByRole('alertdialog', { name: 'Sign in again' })
  await dialog.waitFor()
  expect(await notePart(therapist, 'Said').isVisible()).toBe(false)
  await inspect(therapist, 'sign-in-again')

  const saved = nextSave(therapist)
  await dialog.getByLabel('Password', { exact: true }).fill(how.password)
  await press(dialog, 'Sign in and go on')
  await saved
  expect(await notePart(therapist, 'Said').inputValue()).toBe('Typed after the sign-in had ended.')
  await page.reload()
  await expect.poll(() => notePart(therapist, 'Said').inputValue()).toBe('Typed after the sign-in had ended.')
  expectNoFaults()
})

it('shows both texts when one note is changed in two tabs, and loses no word of either', async () => {
  const first = await arrive('therapist', signInOf('mairi'))
  await openFromCaseload(first, 'Soraya Haidari')
  await startNote(first)
  const second = await openTab(first)
  await second.page.goto(first.page.url())
  await notePart(second, 'Observed').waitFor()

  await writeAndKeep(first, 'Observed', 'Words of the first tab.')
  const stale = nextSave(second, 409)
  await notePart(second, 'Observed').fill('Words of the second tab.')
  await stale
  const panel = second.page.getByRole('alert').filter({ hasText: 'while you were writing' })
  await seeText(panel, 'Words of the first tab.')
  await seeText(panel, 'Words of the second tab.')
  await inspect(second, 'note-two-texts')
  const kept = nextSave(second)
  await press(panel, 'Keep mine')
  await kept

  await press(second.page, 'Earlier texts')
  const earlier = second.page.getByRole('region', { name: 'Earlier texts' })
  await earlier.locator('summary').first().waitFor()
  for (const text of await earlier.locator('summary').all()) await text.click()
  await seeText(earlier, 'Words of the first tab.')
  await inspect(second, 'note-earlier-texts')
  await second.page.reload()
  await expect.poll(() => notePart(second, 'Observed').inputValue()).toBe('Words of the second tab.')
  expectNoFaults()
})

it('refuses to save one person’s page under another’s sign-in, and keeps the text for whom it belongs to', async () => {
  const how = signInOf('adaeze')
  const therapist = await arrive('therapist', how)
  const { page } = therapist
  // A page that does not hear of the other tab: only the server can tell whose sign-in it is now.
  await page.addInitScript(() => Reflect.deleteProperty(window, 'BroadcastChannel'))
  await page.reload()
  await openFromCaseload(therapist, 'Mateo Quispe-Arnold')
  await startNote(therapist)
  await writeAndKeep(therapist, 'Said', 'Kept before.')
  const other = await openTab(therapist)
  await other.page.goto(`${url}/profile`)
  await signOut(other)
  await signInHere(other, signInOf('tomasz'))
  await seeText(other.page, /Tomasz/)

  const refused = nextSave(therapist, 409)
  await notePart(therapist, 'Said').fill('Kept before. Typed while somebody else was signed in.')
  expect(((await (await refused).json()) as { code: string }).code).toBe('session_changed')
  const dialog = page.getByRole('alertdialog', { name: 'Sign in again' })
  await seeText(dialog, 'Somebody else has signed in in this browser.')
  expect(await page.locator('main').isVisible()).toBe(false)
  await inspect(therapist, 'somebody-else-signed-in')

  const saved = nextSave(therapist)
  await dialog.getByLabel('Password', { exact: true }).fill(how.password)
  await press(dialog, 'Sign in and go on')
  await saved
  await page.reload()
  await expect
    .poll(() => notePart(therapist, 'Said').inputValue())
    .toBe('Kept before. Typed while somebody else was signed in.')
  expectNoFaults()
})

it('sends one e-mail when the button is pressed twice', async () => {
  const therapist = await arrive('therapist', signInOf('mairi'))
  const { page } = therapist
  const { email } = signInOfParent('rachidBenkirat')
  const letters = async () => (await mailTo(inboxUrl, email)).filter(({ text }) => text.includes('/letter/'))
  const before = (await letters()).length
  await openFromCaseload(therapist, 'Youssef Benkirat')
  await writeWholeLetter(therapist)
  await approveLetter(therapist)
  await press(page, 'Send')
  await press(page, 'Review and send')
  await page.getByRole('alertdialog').getByRole('button', { name: 'Send it', exact: true }).dblclick()
  await seeHeading(page, 'On its way')
  const { link } = await waitForLink(inboxUrl, email, /http\S+\/letter\/[0-9a-f-]{36}/)
  await expect
    .poll(
      async () => {
        await page.reload()
        await seeHeading(page, 'On its way')
        return page.getByText(/Tried 1 time/).count()
      },
      { timeout: 60_000, interval: 1000 },
    )
    .toBe(1)
  const sent = await letters()
  expect(sent).toHaveLength(before + 1)
  expect(sent.filter(({ text }) => text.includes(link))).toHaveLength(1)
  expectNoFaults()
})

it('turns away an upload of 11 MB and a renamed program beside the field, and keeps the rest of the form', async () => {
  const therapist = await arrive('therapist', signInOf('adaeze'))
  const { page } = therapist
  await openFromCaseload(therapist, 'Bright')
  await openSection(page, 'Handwriting')
  await press(page, 'Add a sample')
  const field = page.getByLabel('Picture or PDF')
  const form = page.locator('form').filter({ hasText: 'Add a writing sample' })
  const beside = () =>
    field.evaluate((input) => {
      const ids = input.getAttribute('aria-describedby')?.split(' ') ?? []
      return ids.map((id) => document.getElementById(id)?.textContent ?? '').join(' ')
    })

  const photograph = Buffer.alloc(11 * 1024 * 1024, 0x7f)
  photograph.set([0xff, 0xd8, 0xff, 0xe0])
  await field.setInputFiles({ name: 'page.jpg', mimeType: 'image/jpeg', buffer: photograph })
  await expect.poll(beside).toContain('larger than 8 MB')
  await inspect(therapist, 'upload-too-large')

  const program = Buffer.concat([Buffer.from('MZ'), Buffer.alloc(4096)])
  await field.setInputFiles({ name: 'setup.exe', mimeType: 'application/x-msdownload', buffer: program })
  await expect.poll(beside).toContain('Choose a JPEG, PNG or WebP picture, or a PDF.')
  await field.setInputFiles({ name: 'page.jpg', mimeType: 'image/jpeg', buffer: program })
  await answer(page, /^Is another child’s name or face visible/, 'No')
  await choose(page, /^Task/, 'Copying a sentence')
  await choose(page, /^Kind of writing/, /^Joined letters/)
  await form.getByRole('textbox', { name: /^Note/ }).fill('Written at the kitchen table.')
  const samples = await page.getByRole('article').count()
  await press(page, 'Keep this sample')
  await expect.poll(beside).toContain('the content is something else')
  await inspect(therapist, 'upload-not-a-picture')
  expect(await form.getByRole('textbox', { name: /^Note/ }).inputValue()).toBe(
    'Written at the kitchen table.',
  )
  expect(await page.getByRole('article').count()).toBe(samples)
  expectNoFaults()
})

it('shows nothing to whoever goes back after the sign-out', async () => {
  const therapist = await arrive('therapist', signInOf('adaeze'))
  const { page } = therapist
  await openFromCaseload(therapist, 'Mateo Quispe-Arnold')
  await seeText(page, 'Mateo Quispe-Arnold')
  await signOut(therapist)
  for (let step = 0; step < 4; step += 1) {
    await page.goBack()
    await page.waitForLoadState('networkidle')
    expect(await page.locator('body').innerText()).not.toMatch(/Quispe-Arnold|FF-\d/)
  }
  await page.goto(`${url}/caseload`)
  await page.waitForURL(/\/sign-in/)
  expectNoFaults()
})

it.each([
  { hand: 'left', key: 'adaeze', child: 'Mateo Quispe-Arnold' },
  { hand: 'right', key: 'tomasz', child: 'Priya Raghunath' },
] as const)('keeps the main action under the $hand hand on every width', async ({ hand, key, child }) => {
  const therapist = await arrive('therapist', signInOf(key))
  const { page } = therapist
  await openFromCaseload(therapist, child)
  for (const [section, action] of [
    ['Goals', 'Set a goal'],
    ['Sessions', 'Write a note'],
    ['Letters', 'Progress letter'],
    ['Family and consent', 'Record a consent'],
  ] as const) {
    await page.setViewportSize({ width: 1280, height: 900 })
    await openSection(page, section)
    const edge = page.getByRole('region', { name: 'What you can do here' })
    const button = edge.getByRole('button', { name: action, exact: true })
    for (const width of [1280, 820, 360]) {
      await page.setViewportSize({ width, height: 800 })
      await button.scrollIntoViewIfNeeded()
      const box = await button.boundingBox()
      const centre = ((box?.x ?? Number.NaN) + (box?.width ?? Number.NaN) / 2) / width
      const where = `${action} at ${width} px`
      if (hand === 'left') expect(centre, where).toBeLessThan(1 / 3)
      else expect(centre, where).toBeGreaterThan(2 / 3)
      expect(box?.height, where).toBeGreaterThanOrEqual(44)
    }
  }
  expectNoFaults()
})
