import { mkdirSync, readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { join } from 'node:path'
import { chromium, type Browser, type Page } from 'playwright-core'
import { expect, vi } from 'vitest'
import type { SignIn } from './people.ts'

const axeSource = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8')

export const openBrowser = (): Promise<Browser> =>
  chromium.launch({
    executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium',
    args: [
      '--no-sandbox',
      '--disable-dev-shm-usage',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  })

export interface Person {
  page: Page
  /** Where the clinic is. */
  url: string
  /** Console errors, policy violations and requests to other hosts seen so far. */
  faults: string[]
  close: () => Promise<void>
}

/** Requests of each page that have no answer yet. */
const inFlight = new WeakMap<Page, number>()

const watch = (page: Page, url: string, faults: string[]) => {
  const count = (change: number) => inFlight.set(page, (inFlight.get(page) ?? 0) + change)
  page.on('request', () => count(1))
  page.on('requestfinished', () => count(-1))
  page.on('requestfailed', () => count(-1))
  page.on('console', (message) => {
    // The browser itself reports each refused request; refusals are judged by what the page shows.
    if (message.type() === 'error' && !message.text().includes('Failed to load resource'))
      faults.push(message.text())
  })
  page.on('pageerror', (error) => faults.push(error.message))
  page.on('request', (request) => {
    const target = request.url()
    if (!target.startsWith(`${url}/`) && !/^(data|blob|about):/.test(target))
      faults.push(`request to ${new URL(target).host}`)
  })
}

/** A browser context of one person's own, watched for faults in every tab. */
export const openPerson = async (
  browser: Browser,
  url: string,
  width = 1280,
  height = 900,
  hasTouch = false,
): Promise<Person> => {
  const context = await browser.newContext({
    viewport: { width, height },
    hasTouch,
    locale: 'en-GB',
    timezoneId: 'Europe/London',
    bypassCSP: false,
  })
  context.setDefaultTimeout(30_000)
  const faults: string[] = []
  context.on('page', (page) => watch(page, url, faults))
  const page = await context.newPage()
  return { page, url, faults, close: () => context.close() }
}

/** Fills in the sign-in page that is open. */
export const signInHere = async ({ page }: Person, { email, password }: SignIn): Promise<void> => {
  await page.getByLabel('E-mail address').fill(email)
  await page.getByLabel('Password', { exact: true }).fill(password)
  await page.getByRole('button', { name: 'Sign in', exact: true }).click()
  await page.waitForURL((address) => !address.pathname.startsWith('/sign-in'))
}

export const signIn = async (person: Person, how: SignIn): Promise<void> => {
  await person.page.goto(`${person.url}/sign-in`)
  await signInHere(person, how)
}

/** Signs out as people do; the sign-in page follows. */
export const signOut = async ({ page }: Person): Promise<void> => {
  const menu = page.getByRole('button', { name: 'Menu', exact: true })
  if (await menu.isVisible()) await menu.click()
  await page.getByRole('button', { name: 'Sign out' }).locator('visible=true').last().click()
  await page.waitForURL(/\/sign-in$/)
}

/** Another tab of the same browser: same sign-in, its own page. */
export const openTab = async ({ page, url, faults, close }: Person): Promise<Person> => ({
  page: await page.context().newPage(),
  url,
  faults,
  close,
})

const isQuiet = () =>
  document.querySelector('h1') !== null &&
  document.querySelector('[aria-busy="true"], .load-line, .p-button-loading') === null &&
  document.getAnimations().every(({ playState }) => playState !== 'running')

/**
 * Waits until every request is answered, nothing on the page says it is loading, and nothing fades or moves (half a
 * colour is no colour). It must look so twice: between an answer and what it brings about lies a moment.
 */
export const settled = async (page: Page): Promise<void> => {
  let quiet = 0
  const look = async () => {
    // A page that is just being replaced cannot be asked.
    const now = inFlight.get(page) === 0 && (await page.evaluate(isQuiet).catch(() => false))
    quiet = now ? quiet + 1 : 0
    return quiet > 1
  }
  await vi.waitUntil(look, { timeout: 30_000, interval: 40 })
}

interface AxeResult {
  violations: { id: string; nodes: { target: string[]; failureSummary?: string }[] }[]
}

/** What axe-core looks at: everything; everything but colours; colours alone. */
export type Scan = 'all' | 'structure' | 'colours'

/** No axe-core violation (WCAG 2.0 to 2.2, A and AA, and best practice) on the page as it stands. */
export const expectAccessible = async (page: Page, where: string, scan: Scan = 'all'): Promise<void> => {
  // Through the debugger: the page's own policy refuses scripts from elsewhere, and must go on doing so.
  if (!(await page.evaluate(() => 'axe' in window))) await page.evaluate(axeSource)
  const { violations } = await page.evaluate((wanted) => {
    const { axe } = window as unknown as { axe: { run: (options: object) => Promise<AxeResult> } }
    const tags = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice']
    return axe.run({
      runOnly: wanted === 'colours' ? { type: 'rule', values: ['color-contrast'] } : tags,
      rules: wanted === 'structure' ? { 'color-contrast': { enabled: false } } : {},
      resultTypes: ['violations'],
    })
  }, scan)
  const found = violations.map(
    ({ id, nodes }) =>
      `${id}: ${nodes.map(({ target, failureSummary }) => `${target.join(' ')} ${failureSummary ?? ''}`).join(' | ')}`,
  )
  expect(found, `accessibility of ${where}`).toEqual([])
}

const deviceSetting = /^fanflower\.(findKey=off|look=(left|right) (light|dark|system))$/

/** Nothing but looks chosen for this device is kept in the browser: no clinical text outlives the page. */
export const expectNothingKept = async (page: Page, where: string): Promise<void> => {
  const kept = await page.evaluate(async () => ({
    local: Object.entries(localStorage).map(([key, value]) => `${key}=${String(value)}`),
    session: Object.keys(sessionStorage),
    databases: (await indexedDB.databases()).map(({ name }) => name),
    caches: await caches.keys(),
    workers: (await navigator.serviceWorker.getRegistrations()).length,
  }))
  expect(
    kept.local.filter((entry) => !deviceSetting.test(entry)),
    `local storage on ${where}`,
  ).toEqual([])
  expect({ ...kept, local: [] }, `what the browser keeps of ${where}`).toEqual({
    local: [],
    session: [],
    databases: [],
    caches: [],
    workers: 0,
  })
}

/** Saves a picture when SHOTS names a folder; otherwise does nothing. */
export const shoot = async (page: Page, name: string): Promise<void> => {
  const folder = process.env.SHOTS
  if (!folder) return
  mkdirSync(folder, { recursive: true })
  await page.screenshot({ path: join(folder, `${name}.png`), fullPage: true })
}

/** The page has settled, axe finds nothing, the browser keeps nothing; a picture of it is taken when wanted. */
export const inspect = async ({ page }: Person, where: string): Promise<void> => {
  await settled(page)
  await shoot(page, where)
  await expectAccessible(page, where)
  await expectNothingKept(page, where)
}
