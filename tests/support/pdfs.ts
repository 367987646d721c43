import { deflateSync } from 'node:zlib'
import PDFDocument from 'pdfkit'

interface Parts {
  /** Objects by number, e.g. `3: '<</Type /Page …>>'`; 1 is the catalogue, 2 the page tree, 3 the page. */
  objects?: Record<number, string | Buffer>
  /** More entries of the trailer. */
  trailer?: string
  /** More entries of the catalogue and of the page. */
  catalogue?: string
  page?: string
}

/** A stream object. */
export const stream = (dict: string, data: Buffer | string): Buffer => {
  const bytes = typeof data === 'string' ? Buffer.from(data, 'latin1') : data
  return Buffer.concat([
    Buffer.from(`<<${dict} /Length ${bytes.length}>>\nstream\n`, 'latin1'),
    bytes,
    Buffer.from('\nendstream', 'latin1'),
  ])
}

/** An object stream, deflated: where newer files keep most of their objects, invisible to a search for words. */
export const packed = (objects: Record<number, string>): Buffer => {
  const entries = Object.entries(objects)
  let offset = 0
  const pairs = entries.map(([number, text]) => {
    const pair = `${number} ${offset}`
    offset += text.length + 1
    return pair
  })
  const head = `${pairs.join(' ')} `
  const body = entries.map(([, text]) => text).join(' ')
  return stream(
    `/Type /ObjStm /N ${entries.length} /First ${head.length} /Filter /FlateDecode`,
    deflateSync(Buffer.from(head + body, 'latin1')),
  )
}

/** A PDF of one page with the word “hello”, put together by hand so that anything can be hidden in it. */
export const pdfOf = ({ objects = {}, trailer = '', catalogue = '', page = '' }: Parts = {}): Buffer => {
  const all: Record<number, string | Buffer> = {
    1: `<</Type /Catalog /Pages 2 0 R ${catalogue}>>`,
    2: '<</Type /Pages /Kids [3 0 R] /Count 1 /MediaBox [0 0 595 842]>>',
    3: `<</Type /Page /Parent 2 0 R /Contents 4 0 R /Resources <</Font <</F1 5 0 R>>>> ${page}>>`,
    4: stream('', 'BT /F1 24 Tf 72 720 Td (hello) Tj ET'),
    5: '<</Type /Font /Subtype /Type1 /BaseFont /Helvetica>>',
    ...objects,
  }
  const parts: Buffer[] = [Buffer.from('%PDF-1.5\n%\xe2\xe3\xcf\xd3\n', 'latin1')]
  const offsets: string[] = []
  const length = () => parts.reduce((sum, part) => sum + part.length, 0)
  for (const [number, body] of Object.entries(all)) {
    offsets.push(`${String(length()).padStart(10, '0')} 00000 n \n`)
    parts.push(
      Buffer.from(`${number} 0 obj\n`),
      Buffer.from(body as string, 'latin1'),
      Buffer.from('\nendobj\n'),
    )
  }
  const start = length()
  const count = offsets.length + 1
  parts.push(
    Buffer.from(`xref\n0 ${count}\n0000000000 65535 f \n${offsets.join('')}`),
    Buffer.from(`trailer\n<</Size ${count} /Root 1 0 R ${trailer}>>\nstartxref\n${start}\n%%EOF\n`, 'latin1'),
  )
  return Buffer.concat(parts)
}

export const manyPages = (pages: number): Buffer =>
  pdfOf({
    objects: {
      2: `<</Type /Pages /Kids [${Array(pages).fill('3 0 R').join(' ')}] /Count ${pages} /MediaBox [0 0 595 842]>>`,
    },
  })

/** A PDF as an ordinary program writes it, with a picture, two pages and the author's name. */
export const writtenBy = async (author: string, image: Buffer): Promise<Buffer> => {
  const document = new PDFDocument({ info: { Author: author, Title: `Work of ${author}` } })
  const parts: Buffer[] = []
  document.on('data', (part: Buffer) => parts.push(part))
  const finished = new Promise((resolve) => document.on('end', resolve))
  document.fontSize(20).text('First page').image(image, 100, 200)
  document.addPage({ layout: 'landscape' }).text('Second page')
  document.end()
  await finished
  return Buffer.concat(parts)
}
