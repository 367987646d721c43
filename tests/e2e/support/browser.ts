import { mkdirSync } from 'node:fs'
import { createRequire } from 'node:module'
import { join } from 'node:path'
import { chromium, type Browser, type Page } from 'playwright-core'
import { expect } from 'vitest'
import type { SignIn } from './clinic.ts'

const axeSource = createRequire(import.meta.url).resolve('axe-core/axe.min.js')

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
  /** Console errors, policy violations and requests to other hosts seen so far. */
  faults: string[]
  close: () => Promise<void>
}

/** A browser context of one person's own, watched for faults. */
export const openPerson = async (
  browser: Browser,
  url: string,
  width = 1280,
  height = 900,
): Promise<Person> => {
  const context = await browser.newContext({
    viewport: { width, height },
    locale: 'en-GB',
    timezoneId: 'Europe/London',
    bypassCSP: false,
  })
  const page = await context.newPage()
  page.setDefaultTimeout(15_000)
  const faults: string[] = []
  page.on('console', (message) => {
    // The browser itself reports each refused request; refusals are judged by what the page shows.
    if (message.type() === 'error' && !message.text().includes('Failed to load resource'))
      faults.push(message.text())
  })
  page.on('pageerror', (error) => faults.push(error.message))
  page.on('request', (request) => {
    const target = request.url()
    if (!target.startsWith(url) && !/^(data|blob|about):/.test(target))
      faults.push(`request to ${new URL(target).host}`)
  })
  return { page, faults, close: () => context.close() }
}

export const signIn = async ({ page }: Person, url: string, { email, password }: SignIn): Promise<void> => {
  await page.goto(`${url}/sign-in`)
  await page.getByLabel('E-mail address').fill(email)
  await page.getByLabel('Password', { exact: true }).fill(password)
  await page.getByRole('button', { name: 'Sign in', exact: true }).click()
  await page.waitForURL((address) => !address.pathname.startsWith('/sign-in'))
}

interface AxeResult {
  violations: { id: string; nodes: { target: string[]; failureSummary?: string }[] }[]
}

/** Waits until nothing on the page says it is loading. */
export const settled = async (page: Page): Promise<void> => {
  await page.waitForLoadState('networkidle')
  await page.waitForFunction(() => document.querySelector('[aria-busy="true"], .p-skeleton') === null)
}

/** No axe-core violation (WCAG 2.0–2.2 A and AA, and best practice) on the page as it stands. */
export const expectAccessible = async (page: Page, where: string): Promise<void> => {
  await settled(page)
  await page.addScriptTag({ path: axeSource }).catch(() => undefined)
  // A page whose policy refuses the tag gets the engine through the debugger instead.
  const present = await page.evaluate(() => 'axe' in window)
  if (!present) await page.evaluate((await import('node:fs')).readFileSync(axeSource, 'utf8'))
  const { violations } = await page.evaluate(() =>
    (window as unknown as { axe: { run: (options: object) => Promise<AxeResult> } }).axe.run({
      runOnly: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'],
    }),
  )
  const found = violations.map(
    ({ id, nodes }) => `${id}: ${nodes.map((node) => node.target.join(' ')).join(' | ')}`,
  )
  expect(found, `accessibility of ${where}`).toEqual([])
}

/** Saves a picture when SHOTS names a folder; otherwise does nothing. */
export const shoot = async (page: Page, name: string): Promise<void> => {
  const folder = process.env.SHOTS
  if (!folder) return
  mkdirSync(folder, { recursive: true })
  await page.screenshot({ path: join(folder, `${name}.png`), fullPage: true })
}
