import { inflateSync } from 'node:zlib'
import { describe, expect, it } from 'vitest'
import { AppError } from '../../server/errors.ts'
import { readPdfFile } from '../../server/uploads/pdfFile.ts'
import { manyPages, packed, pdfOf, stream, writtenBy } from '../support/pdfs.ts'
import { withSecrets } from '../support/pictures.ts'

const refusal = (bytes: Buffer): string => {
  try {
    readPdfFile(bytes)
  } catch (error) {
    if (error instanceof AppError && error.status === 422) return error.extras.fields?.file ?? ''
    throw error
  }
  return 'accepted'
}

const script = '<</S /JavaScript /JS (app.alert\\(1\\))>>'

describe('a PDF that is kept', () => {
  it('is written anew with the same page and nothing else', () => {
    const stored = readPdfFile(
      pdfOf({
        objects: { 6: '(left over)', 7: stream('/Type /Metadata', 'Canary XMP') },
        catalogue: '/Metadata 7 0 R /Lang (xx)',
      }),
    )
    const text = stored.toString('latin1')
    expect(text).toMatch(/^%PDF-1\.7\n/)
    expect(text).toContain('BT /F1 24 Tf 72 720 Td (hello) Tj ET')
    expect(text).toContain('/BaseFont /Helvetica')
    expect(text).toContain('/MediaBox [0 0 595 842]')
    expect(text).not.toMatch(/left over|Canary|Metadata|Lang/)
    expect(readPdfFile(stored).equals(stored), 'writing it once more changes nothing').toBe(true)
  })

  it('has a cross-reference table that leads to each object', () => {
    const stored = readPdfFile(pdfOf()).toString('latin1')
    const start = Number(/startxref\n(\d+)\n%%EOF\n$/.exec(stored)?.[1])
    expect(stored.slice(start, start + 5)).toBe('xref\n')
    const offsets = [...stored.slice(start).matchAll(/(\d{10}) 00000 n /g)].map((match) => Number(match[1]))
    expect(offsets.length).toBeGreaterThan(3)
    offsets.forEach((offset, index) => {
      expect(stored.slice(offset).startsWith(`${index + 1} 0 obj\n`)).toBe(true)
    })
  })

  it('keeps what an ordinary program drew and loses its author, title and the picture’s own data', async () => {
    const original = await writtenBy('Canary Author', await withSecrets())
    expect(original.toString('latin1')).toMatch(/Canary/)
    const stored = readPdfFile(original)
    expect(stored.toString('latin1')).not.toMatch(/Canary|Exif|pdfkit/i)
    const drawn = (file: Buffer) =>
      [...file.toString('latin1').matchAll(/FlateDecode\b[^]*?stream\r?\n/g)].map((match) =>
        inflateSync(file.subarray(match.index + match[0].length), { finishFlush: 2 }).toString('latin1'),
      )
    expect(drawn(stored).toSorted()).toEqual(drawn(original).toSorted())
    expect(stored.toString('latin1').match(/\/Type \/Page\n|\/Type \/Page /g)).toHaveLength(2)
  })

  it('is found behind object streams, replaced objects and escaped names', () => {
    const font = packed({ 5: '<</Type /Font /Subtype /Type1 /BaseFont /Times-Roman>>' })
    const stored = readPdfFile(pdfOf({ objects: { 5: 'null', 6: font } })).toString('latin1')
    expect(stored).toContain('/BaseFont /Times-Roman')
    const escaped = readPdfFile(
      pdfOf({ objects: { 5: '<</Type /Font /Sub#74ype /Type1 /BaseFont /A#20B>>' } }),
    )
    expect(escaped.toString('latin1')).toContain('/Subtype /Type1\n/BaseFont /A#20B')
  })

  it('may have 30 pages, and may have links, which are left out', () => {
    expect(
      readPdfFile(manyPages(30))
        .toString('latin1')
        .match(/\/Type \/Page[ \n]/g),
    ).toHaveLength(30)
    const linked = pdfOf({
      page: '/Annots [<</Type /Annot /Subtype /Link /Rect [0 0 9 9] /A <</S /URI /URI (https://x.example)>>>>]',
    })
    expect(readPdfFile(linked).toString('latin1')).not.toMatch(/URI|Annot/)
  })
})

describe('a PDF that is refused', () => {
  it.each([
    [
      'a script in the catalogue’s names',
      pdfOf({ catalogue: `/Names <</JavaScript <</Names [(x) ${script}]>>>>` }),
      'program',
    ],
    ['a script no page leads to', pdfOf({ objects: { 6: script } }), 'program'],
    ['a script behind an escaped name', pdfOf({ objects: { 6: '<</S /J#61vaScript>>' } }), 'program'],
    ['a script’s key behind an escaped name', pdfOf({ objects: { 6: '<</#4aS (x)>>' } }), 'program'],
    [
      'a script packed into an object stream',
      pdfOf({ objects: { 6: packed({ 7: '[1 2]', 8: script }) } }),
      'program',
    ],
    [
      'a script whose kind is given by reference',
      pdfOf({ objects: { 6: '<</S 7 0 R>>', 7: '/JavaScript' } }),
      'program',
    ],
    [
      'a PostScript drawing',
      pdfOf({ objects: { 6: stream('/Type /XObject /Subtype /PS', '(x) show') } }),
      'program',
    ],
    [
      'a command to start a program',
      pdfOf({ objects: { 6: '<</S /Launch /F (cmd.exe)>>' } }),
      'start another program',
    ],
    [
      'a way into another file',
      pdfOf({ objects: { 6: '<</S /GoToR /F (other.pdf)>>' } }),
      'open another file',
    ],
    [
      'an action on opening',
      pdfOf({ catalogue: '/OpenAction <</S /GoTo /D [3 0 R /Fit]>>' }),
      'acts by itself',
    ],
    ['an action of a page', pdfOf({ page: '/AA <</O <</S /Named /N /Print>>>>' }), 'acts by itself'],
    ['an attached file', pdfOf({ catalogue: '/Names <</EmbeddedFiles <</Names []>>>>' }), 'another file'],
    [
      'an attached file’s own stream',
      pdfOf({ objects: { 6: stream('/Type /EmbeddedFile', 'MZ') } }),
      'another file',
    ],
    [
      'an attachment pinned to the page',
      pdfOf({ page: '/Annots [<</Subtype /FileAttachment>>]' }),
      'another file',
    ],
    [
      'a stream that is read from a file',
      pdfOf({ objects: { 4: stream('/F (/etc/passwd)', '') } }),
      'another file',
    ],
    ['a form with a program', pdfOf({ catalogue: '/AcroForm <</XFA [(a) 6 0 R]>>' }), 'form'],
    [
      'a form that sends what is typed',
      pdfOf({ objects: { 6: '<</S /SubmitForm /F (https://x.example)>>' } }),
      'sends data',
    ],
    ['sound and film', pdfOf({ page: '/Annots [<</Subtype /RichMedia>>]' }), 'sound'],
    ['a password', pdfOf({ trailer: '/Encrypt <</Filter /Standard /V 2>>' }), 'password'],
    [
      'comments that would be lost',
      pdfOf({ page: '/Annots [<</Subtype /Ink /InkList [[1 1 9 9]]>>]' }),
      'comments',
    ],
    ['31 pages', manyPages(31), 'more than 30 pages'],
    ['no pages', pdfOf({ objects: { 2: '<</Type /Pages /Kids [] /Count 0>>' } }), 'cannot be checked'],
    [
      'a page tree that is a circle',
      pdfOf({ objects: { 2: '<</Type /Pages /Kids [2 0 R]>>' } }),
      'cannot be checked',
    ],
    [
      'an object stream under another filter',
      pdfOf({ objects: { 6: stream('/Type /ObjStm /N 1 /First 4 /Filter /LZWDecode', 'xx') } }),
      'cannot be checked',
    ],
    [
      'an object stream that is broken',
      pdfOf({ objects: { 6: stream('/Type /ObjStm /N 1 /First 4 /Filter /FlateDecode', 'xx') } }),
      'cannot be checked',
    ],
    [
      'another file after its end',
      Buffer.concat([pdfOf(), Buffer.from('PK\x03\x04 and more')]),
      'cannot be checked',
    ],
    [
      'a web page before its end',
      pdfOf({ objects: { 6: '<script>alert(1)</script>' } }),
      'cannot be checked',
    ],
    ['its second half missing', pdfOf().subarray(0, 300), 'cannot be checked'],
    ['only its first line', Buffer.from('%PDF-1.7\n'), 'cannot be checked'],
    ['arrays without end', pdfOf({ objects: { 6: '['.repeat(100_000) } }), 'cannot be checked'],
    ['a reference to itself', pdfOf({ objects: { 2: '2 0 R' } }), 'cannot be checked'],
  ])('for %s, with the reason', (_what, bytes, reason) => {
    expect(refusal(bytes)).toContain(reason)
  })

  it('for an object stream that grows beyond 32 MB, in a moment', () => {
    const bytes = pdfOf({ objects: { 6: packed({ 7: ' '.repeat(40 * 1024 * 1024) }) } })
    const start = performance.now()
    expect(refusal(bytes)).toContain('cannot be checked')
    expect(performance.now() - start).toBeLessThan(2000)
  })

  it('for objects that share one text to be read without end, in a moment', () => {
    const text = '[' + '1 '.repeat(100_000) + ']'
    const head = Array.from({ length: 40_000 }, (_, index) => `${index + 10} 0`).join(' ') + ' '
    const bytes = pdfOf({
      objects: { 6: stream(`/Type /ObjStm /N 40000 /First ${head.length}`, head + text) },
    })
    const start = performance.now()
    expect(refusal(bytes)).toContain('cannot be checked')
    expect(performance.now() - start).toBeLessThan(2000)
  })

  it('or kept, but never fails otherwise, whatever single byte is changed', () => {
    const original = pdfOf({ objects: { 6: packed({ 7: '[1 2]' }) } })
    for (let at = 0; at < original.length; at += 3) {
      const changed = Buffer.from(original)
      changed[at] = (changed[at] ?? 0) ^ 0x15
      expect(typeof refusal(changed)).toBe('string')
    }
  })
})
