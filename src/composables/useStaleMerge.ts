import { computed, shallowRef, toRaw, watch, type Ref } from 'vue'
import { inWords, mergeChanges, type Say } from './differences.ts'

interface MergedForm<Draft extends object, View extends { version: number }> {
  /** What the form opened with. */
  opened: Draft
  /** Sent as `If-Match`; moves on only when what is stored has been taken into account. */
  version: Ref<number>
  /** Of `useForm`. */
  form: {
    values: Draft
    conflict: Readonly<Ref<unknown>>
    busy: Readonly<Ref<boolean>>
    submit: () => Promise<void>
  }
  draftOf: (stored: View) => Draft
  labels: Partial<Record<keyof Draft, string>>
  say?: Say<Draft>
}

/**
 * After a stale save: changes to different fields are both kept and sent again by themselves; where both people changed
 * the same field, `parts` shows the two texts and one of them is chosen. Nothing is overwritten unseen.
 */
export function useStaleMerge<Draft extends object, View extends { version: number }>({
  opened,
  version,
  form: { values, conflict, busy, submit },
  draftOf,
  labels,
  say,
}: MergedForm<Draft, View>) {
  let base = structuredClone(opened)
  const clash = shallowRef<{ names: (keyof Draft)[]; theirs: Draft } | null>(null)

  watch(busy, async (now) => {
    const stored = conflict.value as View | null
    if (now || stored === null) return
    const theirs = draftOf(stored)
    const { merged, clashes } = mergeChanges(base, structuredClone(toRaw(values)), theirs)
    Object.assign(values, merged)
    base = structuredClone(theirs)
    version.value = stored.version
    clash.value = clashes.length === 0 ? null : { names: clashes, theirs }
    if (clash.value === null) await submit()
  })

  return {
    parts: computed(() =>
      clash.value ? inWords(clash.value.names, values, clash.value.theirs, labels, say) : [],
    ),
    keepMine: async () => {
      clash.value = null
      await submit()
    },
    takeTheirs: () => {
      for (const name of clash.value?.names ?? []) values[name] = clash.value!.theirs[name]
      clash.value = null
    },
  }
}
