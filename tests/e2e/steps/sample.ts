import sharp from 'sharp'
import { expect } from 'vitest'
import { inspect, type Person } from '../support/browser.ts'
import { answer, choose, openSection, press, seeHeading, seeText } from '../support/fields.ts'

/** How the sheet lies once it is upright. */
const width = 1500
const height = 1000
/** EXIF 6: the stored picture must be turned by 90 degrees clockwise to stand upright. */
const turnedClockwise = 6

const wave = (y: number, amplitude: number) =>
  Array.from(
    { length: 60 },
    (_, index) => `${80 + index * 22} ${y + (index % 2 ? amplitude : -amplitude)}`,
  ).join(' L ')

/**
 * A photograph of a page of writing as a phone stores it: lying on its side, with an orientation and a place in its
 * metadata. Paper grain makes it big enough for the progress to be seen.
 */
const drawPhotograph = async (amplitude: number): Promise<Buffer> => {
  const lines = [200, 400, 600, 800].map(
    (y) => `<path d="M ${wave(y, amplitude)}" fill="none" stroke="#22306b" stroke-width="7"/>`,
  )
  const page = `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}">${lines.join('')}</svg>`
  const grain = { type: 'gaussian' as const, mean: 235, sigma: 12 }
  const upright = await sharp({ create: { width, height, channels: 3, background: '#ffffff', noise: grain } })
    .composite([{ input: Buffer.from(page) }])
    .png()
    .toBuffer()
  return sharp(upright)
    .rotate(-90)
    .jpeg({ quality: 95 })
    .withMetadata({ orientation: turnedClockwise })
    .withExifMerge({ IFD3: { GPSLatitudeRef: 'N', GPSLatitude: '51/1 30/1 0/1' } })
    .toBuffer()
}

/** Fills in the form of one sample; whoever calls sends it. */
const fillSample = async (
  { page }: Person,
  photograph: { name: string; buffer: Buffer },
  facts: { takenOn: string; letters: string; legible: string },
) => {
  await page.getByRole('button', { name: 'Add a sample' }).first().click()
  await seeHeading(page, 'Add a writing sample')
  await page.getByLabel('Picture or PDF').setInputFiles({ ...photograph, mimeType: 'image/jpeg' })
  await answer(page, /^Is another child’s name or face visible/, 'No')
  await page.getByLabel('Written on').fill(facts.takenOn)
  await choose(page, /^Task/, 'Copying a sentence')
  await choose(page, /^Kind of writing/, 'Separate letters')
  await page.getByLabel(/^Time/).fill('60')
  await page.getByLabel(/^Letters/).fill(facts.letters)
  await page.getByLabel(/^Readable letters/).fill(facts.legible)
}

/** Photographs arrive upright and without metadata, stand on the wall, and two open side by side. */
export const addSamples = async (
  therapist: Person,
  days: { earlier: string; today: string },
): Promise<void> => {
  const { page } = therapist
  await openSection(page, 'Handwriting')
  await seeText(page, 'No writing sample yet')
  const first = { name: 'before.jpg', buffer: await drawPhotograph(40) }
  expect((await sharp(first.buffer).metadata()).orientation).toBe(turnedClockwise)
  await fillSample(therapist, first, { takenOn: days.earlier, letters: '21', legible: '19' })
  await inspect(therapist, 'sample-form')

  // As over a slow line: the bar must be there while the picture is on its way.
  const network = await page.context().newCDPSession(page)
  const slow = {
    offline: false,
    latency: 0,
    downloadThroughput: -1,
    uploadThroughput: first.buffer.length / 3,
  }
  await network.send('Network.enable')
  await network.send('Network.emulateNetworkConditions', slow)
  await press(page, 'Keep this sample')
  await page.getByRole('progressbar', { name: 'Sending before.jpg' }).waitFor()
  await network.send('Network.emulateNetworkConditions', { ...slow, uploadThroughput: -1 })
  await page.getByRole('article').getByRole('img').waitFor()

  const second = { name: 'today.jpg', buffer: await drawPhotograph(25) }
  await fillSample(therapist, second, { takenOn: days.today, letters: '26', legible: '25' })
  await press(page, 'Keep this sample')
  await expect.poll(() => page.getByRole('article').count()).toBe(2)
  await inspect(therapist, 'sample-wall')

  for (const box of await page.getByRole('checkbox', { name: 'Set side by side' }).all()) await box.check()
  const pair = page.getByRole('region', { name: 'Side by side' })
  const pictures = pair.getByRole('img')
  await expect.poll(() => pictures.count()).toBe(2)
  const sizes = () =>
    pictures.evaluateAll((images) =>
      images.map((image) => [
        (image as HTMLImageElement).naturalWidth,
        (image as HTMLImageElement).naturalHeight,
      ]),
    )
  await expect.poll(sizes).toEqual([
    [width, height],
    [width, height],
  ])
  await inspect(therapist, 'samples-side-by-side')
  const stored = await page.request.get(
    await pictures.first().evaluate((image) => (image as HTMLImageElement).src),
  )
  const metadata = await sharp(await stored.body()).metadata()
  expect({ exif: metadata.exif, orientation: metadata.orientation ?? 1 }).toEqual({
    exif: undefined,
    orientation: 1,
  })
}
