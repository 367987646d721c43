import { useQuery, useQueryCache } from '@pinia/colada'
import { toValue, type MaybeRefOrGetter } from 'vue'
import { childrenApi } from '@/api/children.ts'

/** Key of everything kept of one child: whatever is written makes all of it stale together. */
export const childKey = (childId: string, ...rest: (string | number)[]) => ['children', childId, ...rest]

/** Who the child is, for the frame of the record and for every place that must name them before an act. */
export function useChildHeader(childId: MaybeRefOrGetter<string>) {
  return useQuery({
    key: () => childKey(toValue(childId), 'header'),
    query: () => childrenApi.header(toValue(childId)),
  })
}

/** After a write: asks again for what is on the screen, and marks the rest of this child's pages as old. */
export function useChildRefresh(childId: MaybeRefOrGetter<string>) {
  const cache = useQueryCache()
  return () => cache.invalidateQueries({ key: childKey(toValue(childId)) })
}
