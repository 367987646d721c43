import type { SampleDetails } from '../../shared/samples.ts'
import type { Client } from './app.ts'

export const sampleDetails = (given: Partial<SampleDetails> = {}): SampleDetails => ({
  takenOn: '2026-06-09',
  task: 'copy',
  script: 'print',
  seconds: 120,
  letters: 116,
  legibleLetters: 107,
  reversals: 1,
  smudge: 'light',
  lineAdherence: 4,
  otherChildVisible: false,
  note: null,
  ...given,
})

export interface Upload {
  bytes: Buffer
  name?: string
  type?: string
  details?: object
  key?: string
}

/** Sends a file the way the upload form does. */
export const upload = (
  by: Client,
  childId: string,
  { bytes, name = 'page.jpg', type = 'image/jpeg', details = sampleDetails(), key }: Upload,
) => {
  const request = by.post(`/api/children/${childId}/samples`)
  if (key !== undefined) void request.set('Idempotency-Key', key)
  return request
    .field('details', JSON.stringify(details))
    .attach('file', bytes, { filename: name, contentType: type })
}
