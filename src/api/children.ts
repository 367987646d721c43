import { http } from '@/api/http.ts'
import type {
  Allocation,
  CareDetails,
  ChildHeader,
  ChildIdentity,
  ChildIdentityView,
  FoundChild,
  GlanceView,
} from '@shared/children.ts'
import type { StateChange } from '@shared/episodes.ts'

const path = (childId: string) => `/children/${childId}`

export const childrenApi = {
  /** At most ten, by name or record number. */
  find: (q: string) => http.get<FoundChild[]>('/children/find', { query: { q } }),
  header: (childId: string) => http.get<ChildHeader>(path(childId)),
  glance: (childId: string) => http.get<GlanceView>(`${path(childId)}/glance`),
  identity: (childId: string) => http.get<ChildIdentityView>(`${path(childId)}/identity`),
  saveIdentity: (childId: string, identity: ChildIdentity, version: number) =>
    http.put<ChildIdentityView>(`${path(childId)}/identity`, identity, { ifMatch: version }),
  saveCare: (childId: string, care: CareDetails, version: number) =>
    http.patch<void>(`${path(childId)}/care`, care, { ifMatch: version }),
  changeState: (childId: string, change: StateChange, episodeVersion: number) =>
    http.post<void>(`${path(childId)}/state`, change, { ifMatch: episodeVersion }),
  allocate: (childId: string, allocation: Allocation) =>
    http.post<void>(`${path(childId)}/allocation`, allocation),
}
