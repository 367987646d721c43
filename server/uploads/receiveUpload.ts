import type { RequestHandler } from 'express'
import multer, { MulterError } from 'multer'
import { maximumPdfBytes } from '../../shared/samples.ts'
import { AppError } from '../errors.ts'

/** A file as the browser named and sent it. Nothing about it is believed yet. */
export interface ReceivedFile {
  originalname: string
  mimetype: string
  buffer: Buffer
}

const textLimit = 64 * 1024
const textFields = 10

/** The largest file, all text fields at their limit, and room for the lines between the parts. */
const mostBodyBytes = maximumPdfBytes + (textFields + 1) * textLimit

const receive = multer({
  storage: multer.memoryStorage(),
  // Browsers send file names as UTF-8; multer reads them as latin1 unless told.
  defParamCharset: 'utf8',
  limits: {
    fileSize: maximumPdfBytes,
    files: 1,
    fields: textFields,
    parts: 20,
    fieldSize: textLimit,
    fieldNameSize: 50,
    fieldNestingDepth: 0,
    fieldArrayIndexLimit: 0,
    headerPairs: 20,
  },
}).single('file')

/**
 * Takes one file (field `file`) and a few text fields into memory, within limits. A body announced as too long is
 * refused before any of it is held; one that breaks off or cannot be read is a 400; nothing of it is kept.
 */
export const receiveUpload: RequestHandler = (req, res, next) => {
  if (Number(req.headers['content-length']) > mostBodyBytes)
    return next(new MulterError('LIMIT_FILE_SIZE', 'file'))
  receive(req, res, (error: unknown) => {
    if (error === undefined || error === null || error instanceof MulterError || error instanceof AppError)
      return next(error)
    next(new AppError(400, 'unreadable', 'The upload broke off. Choose the file again.'))
  })
}
