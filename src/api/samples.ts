import { http } from '@/api/http.ts'
import type { SampleDetails, SampleView, SampleWallView } from '@shared/samples.ts'

const path = (childId: string) => `/children/${childId}/samples`

export interface SampleUpload {
  file: File
  details: SampleDetails
  idempotencyKey: string
  signal: AbortSignal
  onProgress: (share: number) => void
}

export const samplesApi = {
  forChild: (childId: string) => http.get<SampleWallView>(path(childId)),
  add: (childId: string, { file, details, ...options }: SampleUpload) => {
    const form = new FormData()
    form.append('details', JSON.stringify(details))
    form.append('file', file)
    return http.upload<SampleView>(path(childId), form, options)
  },
  remove: (childId: string, id: string) => http.delete<void>(`${path(childId)}/${id}`),
  /** Addresses for `<img>` and downloads; the session cookie goes with them. */
  fileUrl: (childId: string, id: string) => `/api${path(childId)}/${id}/file`,
  thumbnailUrl: (childId: string, id: string) => `/api${path(childId)}/${id}/thumbnail`,
}
