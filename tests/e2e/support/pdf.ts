import { execFileSync } from 'node:child_process'
import { expect } from 'vitest'

/** The words of a PDF, in the order of the page and with single spaces; the bytes must begin as a PDF's do. */
export const readPdf = (bytes: Buffer): string => {
  expect(bytes.subarray(0, 5).toString('latin1')).toBe('%PDF-')
  return execFileSync('pdftotext', ['-layout', '-', '-'], { input: bytes })
    .toString('utf8')
    .replace(/\s+/g, ' ')
}
