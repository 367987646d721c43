import type { Day } from '../../shared/days.ts'
import type { SampleDetails, SampleType } from '../../shared/samples.ts'
import { isId } from '../../shared/fields.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { Viewer } from '../access/actor.ts'
import { notFound } from '../errors.ts'
import { within } from './scope.ts'
import { count, fromJson, selectOne, selectRows } from './sql.ts'

interface StoredSample {
  id: string
  childId: string
  takenOn: Day
  birthDate: Day
  details: string
  contentType: SampleType
  bytes: number
  width: number | null
  height: number | null
  pixelsPerMm: string | null
  uploadedBy: string
  uploadedAt: Date
}

export interface SampleRecord extends Omit<StoredSample, 'details'> {
  details: SampleDetails
}

const selectSamples = async (
  access: ChildAccess,
  condition: string,
  parameters: Record<string, string> = {},
): Promise<SampleRecord[]> => {
  const scope = within(access, 's.childId')
  const rows = await selectRows<StoredSample>(
    `SELECT s.id, s.childId, s.takenOn, c.birthDate, s.details, s.contentType, s.bytes, s.width, s.height,
       s.pixelsPerMm, u.displayName AS uploadedBy, s.uploadedAt
     FROM samples s JOIN children c ON c.id = s.childId JOIN users u ON u.id = s.uploadedById
     WHERE s.removedAt IS NULL AND ${scope.sql} AND ${condition} ORDER BY s.takenOn, s.uploadedAt, s.id`,
    { ...scope.parameters, ...parameters },
  )
  return rows.map((row) => ({ ...row, details: fromJson<SampleDetails>(row.details) }))
}

/** Samples of a child in the order they were written, without their bytes. */
export const listSamples = (access: ChildAccess): Promise<SampleRecord[]> => selectSamples(access, '1 = 1')

export const findSample = async (access: ChildAccess, id: string): Promise<SampleRecord> => {
  if (!isId(id)) throw notFound()
  const [found] = await selectSamples(access, 's.id = :sampleId', { sampleId: id })
  if (!found) throw notFound()
  return found
}

export interface SampleFile {
  id: string
  takenOn: Day
  recordNumber: string
  contentType: SampleType
  sha256: Buffer
  content: Buffer
}

/** The stored file itself. */
export const findSampleFile = async (access: ChildAccess, id: string): Promise<SampleFile> => {
  if (!isId(id)) throw notFound()
  const scope = within(access, 's.childId')
  const file = await selectOne<SampleFile>(
    `SELECT s.id, s.takenOn, c.recordNumber, s.contentType, s.sha256, s.content
     FROM samples s JOIN children c ON c.id = s.childId
     WHERE s.id = :sampleId AND s.removedAt IS NULL AND ${scope.sql}`,
    { ...scope.parameters, sampleId: id },
  )
  if (!file) throw notFound()
  return file
}

/** The small JPEG of a picture; 404 for a PDF, which has none. */
export const findSampleThumbnail = async (access: ChildAccess, id: string): Promise<Buffer> => {
  if (!isId(id)) throw notFound()
  const scope = within(access, 's.childId')
  const row = await selectOne<{ thumbnail: Buffer | null }>(
    `SELECT s.thumbnail FROM samples s WHERE s.id = :sampleId AND s.removedAt IS NULL AND ${scope.sql}`,
    { ...scope.parameters, sampleId: id },
  )
  if (!row?.thumbnail) throw notFound()
  return row.thumbnail
}

/** Bytes stored for a child, removed samples included: they still take room. */
export const bytesStoredFor = async (access: ChildAccess): Promise<number> => {
  const scope = within(access, 's.childId')
  const row = await selectOne<{ stored: string | null }>(
    `SELECT SUM(s.bytes) AS stored FROM samples s WHERE ${scope.sql}`,
    scope.parameters,
  )
  return row?.stored ? count(row.stored) : 0
}

/** How many files one person has sent since a moment, for whichever child. */
export const uploadsBy = async (viewer: Viewer, since: Date): Promise<number> => {
  const row = await selectOne<{ sent: string }>(
    'SELECT COUNT(*) AS sent FROM samples s WHERE s.uploadedById = :viewer AND s.uploadedAt > :since',
    { viewer: viewer.id, since },
  )
  return row ? count(row.sent) : 0
}
