import { readPdf } from './pdfDocument.ts'
import { refuseHazards } from './pdfHazards.ts'
import { listPages, rewritePdf } from './pdfRewriting.ts'
import { uncheckable } from './pdfValues.ts'

/**
 * Checks a PDF and writes it anew with its pages alone. Refused (422): programs, actions, attachments, forms with
 * programs, passwords, more than 30 pages, damage. Left behind: author, dates, descriptions, links. Nothing is drawn.
 */
export const readPdfFile = (bytes: Buffer): Buffer => {
  const document = readPdf(bytes)
  refuseHazards(document)
  const rewritten = rewritePdf(document)
  // Read back what will be stored: it must hold the same pages and pass the same check.
  const again = readPdf(rewritten)
  refuseHazards(again)
  if (listPages(again).pages.length !== listPages(document).pages.length) throw uncheckable()
  return rewritten
}
