// pdfkit knows this subset; its published types do not yet.
const declaredAccessible: object = { subset: 'PDF/UA' }

/** Settings of every file we print: tagged, in English, titled, and without a time of its own. */
export const documentSettings = (named: {
  /** Without a child's name: titles are shown in lists of files and in window bars. */
  title: string
  clinicName: string
  /** ISO moment that dates the text, so that the same text gives the same bytes. */
  at: string
}): PDFKit.PDFDocumentOptions => ({
  size: 'A4',
  pdfVersion: '1.7',
  tagged: true,
  lang: 'en-GB',
  displayTitle: true,
  bufferPages: true,
  autoFirstPage: false,
  margin: 0,
  ...declaredAccessible,
  info: {
    Title: `${named.title} from ${named.clinicName}`,
    Author: named.clinicName,
    Creator: 'Fanflower',
    Producer: 'Fanflower',
    CreationDate: new Date(named.at),
  },
})

/** The bytes of a file once it has ended. */
export const collect = (pdf: PDFKit.PDFDocument): Promise<Buffer> =>
  new Promise((resolve, reject) => {
    const chunks: Buffer[] = []
    pdf.on('data', (chunk: Buffer) => chunks.push(chunk))
    pdf.on('end', () => resolve(Buffer.concat(chunks)))
    pdf.on('error', reject)
  })
