import { formatDay } from '../../shared/days.ts'
import { formatQuotient } from '../../shared/laterality.ts'
import { rowName, sideWords, tracksOf, type LateralLineRow } from '../../shared/lateralLine.ts'
import { breakIntoLines, drawLine, type Line, type TextStyle } from './letterLayout.ts'
import type { Pages, Place } from './letterPages.ts'
import { colours, styles } from './reportStyles.ts'

interface Track {
  names: Line[]
  /** The newest value and its side in words. */
  values: { line: Line; style: TextStyle }[]
  /** The newest occasion first. */
  rows: LateralLineRow[]
  height: number
}

/** Columns within the page's text column, in points: names, the line itself, values and their width. */
const columns = { name: 124, lineFrom: 142, lineTo: 362, value: 378, valueWidth: 57 }
const axisHeight = 30
const shortestTrack = 34
const pictureLimit = 560

/** Position of −100 … +100 along the line, in points from the left of the text column. */
const at = (value: number) =>
  columns.lineFrom +
  ((Math.min(100, Math.max(-100, value)) + 100) / 200) * (columns.lineTo - columns.lineFrom)

const valueLines = (pdf: PDFKit.PDFDocument, row: LateralLineRow): Track['values'] => {
  const set = (text: string, style: TextStyle) =>
    breakIntoLines(pdf, text, style, columns.valueWidth).map((line) => ({ line, style }))
  return [
    ...(row.value === null ? [] : set(formatQuotient(row.value), styles.cellStrong)),
    ...set(sideWords(row), styles.cell),
  ]
}

const laidOut = (pdf: PDFKit.PDFDocument, rows: readonly LateralLineRow[]): Track[] =>
  tracksOf(rows).map((track) => {
    const names = [
      ...breakIntoLines(pdf, track.measure, styles.cellStrong, columns.name),
      ...(track.informant ? breakIntoLines(pdf, track.informant, styles.cell, columns.name) : []),
    ]
    const values = track.rows.slice(0, 1).flatMap((newest) => valueLines(pdf, newest))
    const most = Math.max(names.length, values.length)
    return {
      names,
      values,
      rows: track.rows,
      height: Math.max(shortestTrack, most * styles.cell.leading + 8),
    }
  })

/** '−88.2, left', or 'not scorable'. */
export const valueInWords = (row: LateralLineRow): string =>
  [row.value === null ? null : formatQuotient(row.value), sideWords(row).toLowerCase()]
    .filter((part) => part !== null)
    .join(', ')

const inWords = (row: LateralLineRow): string =>
  `${rowName(row)}, ${formatDay(row.occasion)}: ${valueInWords(row)}`

/** The picture in words, for those who do not see it. The table under it has every figure. */
const alternative = (tracks: readonly Track[]): string => {
  const lines = tracks.flatMap(({ rows }) => rows.slice(0, 1).map(inWords))
  const earlier = tracks.reduce((sum, { rows }) => sum + rows.length - 1, 0)
  const more = earlier === 0 ? '' : ` Earlier occasions drawn lighter: ${earlier}.`
  return `Lateral line from −100, always the left hand, to +100, always the right hand. ${lines.join('. ')}.${more}`
}

/** Tracks for one picture each: no picture is higher than a page. */
function inPictures(tracks: readonly Track[]): Track[][] {
  const pictures: Track[][] = []
  let used = Infinity
  for (const track of tracks) {
    if (used + track.height > pictureLimit) {
      pictures.push([])
      used = axisHeight
    }
    pictures.at(-1)?.push(track)
    used += track.height
  }
  return pictures
}

const heightOf = (tracks: readonly Track[]) =>
  tracks.reduce((sum, { height }) => sum + height, axisHeight) + 4

/** Draws the lateral line as vectors with its text alternative. `above` is the height of the heading to stay with it. */
export function printLateralLine(
  pdf: PDFKit.PDFDocument,
  pages: Pages,
  rows: readonly LateralLineRow[],
  heading: { height: number; print: () => void },
): void {
  const pictures = inPictures(laidOut(pdf, rows))
  const [first] = pictures
  pages.keepTogether(heading.height + (first ? heightOf(first) + 8 : 0))
  heading.print()
  for (const tracks of pictures) {
    const height = heightOf(tracks)
    pages.place(height, 8, (place) => {
      const bbox = [place.x, place.top, place.x + pages.width, place.top + height]
      // pdfkit knows the frame of a picture; its published types do not yet.
      const options: object = { alt: alternative(tracks), bbox }
      pages.root.add(pdf.struct('Figure', options, () => drawPicture(pdf, tracks, place)))
    })
  }
}

function drawPicture(pdf: PDFKit.PDFDocument, tracks: readonly Track[], place: Place) {
  drawAxis(pdf, place)
  let top = place.top + axisHeight
  for (const track of tracks) {
    drawTrack(pdf, track, { x: place.x, top })
    top += track.height
  }
}

const centred = (pdf: PDFKit.PDFDocument, text: string, x: number, top: number, style: TextStyle) => {
  const [line] = breakIntoLines(pdf, text, style, 200)
  if (!line) return
  const width = line.reduce((sum, run) => sum + pdf.font(run.font, style.size).widthOfString(run.text), 0)
  drawLine(pdf, line, { x: x - width / 2, top }, style)
}

function drawAxis(pdf: PDFKit.PDFDocument, { x, top }: Place) {
  centred(pdf, 'Left', x + at(-100), top, styles.cellStrong)
  centred(pdf, 'Right', x + at(100), top, styles.cellStrong)
  for (const tick of [-100, -50, 0, 50, 100]) {
    const label = tick === 0 ? '0' : `${tick < 0 ? '−' : '+'}${Math.abs(tick)}`
    centred(pdf, label, x + at(tick), top + 12, { ...styles.cell, colour: colours.inkSoft })
    pdf.moveTo(x + at(tick), top + 25).lineTo(x + at(tick), top + axisHeight)
    pdf.lineWidth(0.75).strokeColor(colours.line).stroke()
  }
}

function drawTrack(pdf: PDFKit.PDFDocument, { names, values, rows, height }: Track, { x, top }: Place) {
  const [newest] = rows
  if (!newest) return
  const middle = top + height / 2
  pdf.moveTo(x, top).lineTo(x + columns.value + columns.valueWidth, top)
  pdf.lineWidth(0.5).strokeColor(colours.lineSoft).stroke()
  const namesTop = middle - (names.length * styles.cell.leading) / 2
  const measureLines = names.length - (newest.informant ? 1 : 0)
  for (const [index, line] of names.entries())
    drawLine(
      pdf,
      line,
      { x, top: namesTop + index * styles.cell.leading },
      index < measureLines ? styles.cellStrong : { ...styles.cell, colour: colours.inkSoft },
    )
  drawBands(pdf, newest, x, top + 1, height - 2)
  for (const value of [-100, 0, 100]) {
    pdf.moveTo(x + at(value), top).lineTo(x + at(value), top + height)
    pdf.lineWidth(0.5).strokeColor(colours.line).stroke()
  }
  pdf.moveTo(x + at(-100), middle).lineTo(x + at(100), middle)
  pdf.lineWidth(0.5).strokeColor(colours.line).stroke()
  for (const row of rows.toReversed()) drawRow(pdf, row, x, middle)
  const valuesTop = middle - (values.length * styles.cell.leading) / 2
  for (const [index, { line, style }] of values.entries())
    drawLine(pdf, line, { x: x + columns.value, top: valuesTop + index * style.leading }, style)
}

function drawBands(
  pdf: PDFKit.PDFDocument,
  { cutOffs, chance }: LateralLineRow,
  x: number,
  top: number,
  height: number,
) {
  const band = (low: number, high: number) => pdf.rect(x + at(low), top, at(high) - at(low), height)
  if (cutOffs) {
    band(-100, cutOffs.left).fill(colours.petalWash)
    band(cutOffs.right, 100).fill(colours.pollenWash)
  }
  if (!chance) return
  pdf.save()
  band(chance.low, chance.high).clip()
  pdf.lineWidth(0.6).strokeColor(colours.line)
  // Hatched, so that it is told from the tints on a grey print too.
  for (let start = at(chance.low) - height; start < at(chance.high); start += 5)
    pdf.moveTo(x + start, top + height).lineTo(x + start + height, top)
  pdf.stroke()
  pdf.restore()
}

function drawRow(
  pdf: PDFKit.PDFDocument,
  { value, interval, latest }: LateralLineRow,
  x: number,
  middle: number,
) {
  if (value === null) return
  const colour = latest ? colours.ink : colours.inkSoft
  drawPetal(pdf, value, x + at(value), middle, latest)
  if (!interval) return
  // Under the mark, which would hide a short one.
  const level = middle + 12
  pdf.lineWidth(latest ? 1.5 : 0.75).strokeColor(colour)
  pdf.moveTo(x + at(interval.low), level).lineTo(x + at(interval.high), level)
  for (const end of [interval.low, interval.high])
    pdf.moveTo(x + at(end), level - 2.5).lineTo(x + at(end), level + 2.5)
  pdf.stroke()
}

/** Half a petal: its flat edge stands on the value, its round side points to the hand. At zero both sides are round. */
function drawPetal(pdf: PDFKit.PDFDocument, value: number, x: number, y: number, latest: boolean) {
  const reach = { x: value < 0 ? -11 : 11, y: 7.5 }
  const fill = !latest || value === 0 ? colours.sheet : value < 0 ? colours.petal : colours.pollen
  pdf.save()
  pdf.moveTo(x, y - reach.y).bezierCurveTo(x + reach.x, y - reach.y, x + reach.x, y + reach.y, x, y + reach.y)
  if (value === 0) pdf.bezierCurveTo(x - reach.x, y + reach.y, x - reach.x, y - reach.y, x, y - reach.y)
  pdf.closePath()
  pdf.lineWidth(latest ? 1 : 0.75)
  if (!latest) pdf.dash(1.8, { space: 1.4 })
  pdf.fillAndStroke(fill, latest ? colours.ink : colours.inkSoft)
  pdf.restore()
}
