import { computed, onScopeDispose, reactive, ref, shallowRef, watch, type Reactive } from 'vue'
import { useRoute, useRouter, type LocationQueryRaw } from 'vue-router'
import { defaultPageSize } from '@shared/pages.ts'

type Direction = 'asc' | 'desc'
type Filters = Record<string, string | null>

interface ListOptions<F extends Filters> {
  /** Column sorted by when the address says nothing. */
  sort?: string
  direction?: Direction
  /** Filters and their values when the address says nothing. Null: no filter. */
  filters?: F
  size?: number
}

const typingPauseInMs = 300

const one = (value: unknown): string | null => (typeof value === 'string' && value !== '' ? value : null)

/**
 * Page, sort, search and filters of one list, kept in the address: a reload, a link and the way back show the same
 * list. Use `key` in the key of useQuery and `query` for the request.
 */
export function useListQuery<F extends Filters = Record<never, never>>(options: ListOptions<F> = {}) {
  const route = useRoute()
  const router = useRouter()
  const base = (options.filters ?? {}) as F
  const names = Object.keys(base)

  // On the way to another page the address changes before this list goes: it must not ask for that page's numbers.
  const home = route.path
  const asked = shallowRef(route.query)
  watch(
    () => route.fullPath,
    () => {
      if (route.path === home) asked.value = route.query
    },
  )

  const page = computed(() => {
    const number = Number(one(asked.value.page))
    return Number.isInteger(number) && number > 0 ? number : 1
  })
  const sort = computed(() => one(asked.value.sort) ?? options.sort ?? null)
  const direction = computed<Direction>(() => {
    const word = one(asked.value.direction)
    return word === 'asc' || word === 'desc' ? word : (options.direction ?? 'asc')
  })
  // A filter present but empty was switched off; one that is absent has its usual value.
  const filterFrom = (name: string) => (name in asked.value ? one(asked.value[name]) : (base[name] ?? null))

  const write = (changes: LocationQueryRaw) => {
    const query = { ...asked.value, ...changes }
    for (const [name, value] of Object.entries(query)) {
      if (value === null || value === undefined) delete query[name]
    }
    return router.replace({ query })
  }
  const filterInAddress = (name: string, value: string | null) =>
    value === (base[name] ?? null) ? null : (value ?? '')

  // What is typed must appear at once, while the address (and so the request) waits for a pause.
  const search = ref<string>(one(asked.value.search) ?? '')
  let pause: ReturnType<typeof setTimeout> | undefined
  watch(search, (words) => {
    clearTimeout(pause)
    pause = setTimeout(() => {
      if ((one(asked.value.search) ?? '') !== words.trim())
        void write({ search: words.trim() || null, page: null })
    }, typingPauseInMs)
  })
  watch(
    () => one(asked.value.search) ?? '',
    (words) => {
      if (search.value.trim() !== words) search.value = words
    },
  )

  const filters = reactive(
    Object.fromEntries(Object.keys(base).map((name) => [name, filterFrom(name)])),
  ) as Reactive<F>
  const held = filters as Record<string, string | null>
  watch(
    () => names.map((name) => held[name]),
    () => {
      const changed = names.filter((name) => held[name] !== filterFrom(name))
      if (changed.length === 0) return
      void write({
        ...Object.fromEntries(changed.map((name) => [name, filterInAddress(name, held[name] ?? null)])),
        page: null,
      })
    },
  )
  watch(
    () => names.map(filterFrom),
    (values) => names.forEach((name, index) => (held[name] = values[index] ?? null)),
  )

  // Somebody who types and then at once opens a row is on the way there: a new search would call them back.
  const leaving = router.beforeEach((to) => {
    if (to.path !== home) clearTimeout(pause)
  })
  onScopeDispose(() => {
    leaving()
    clearTimeout(pause)
  })

  const size = options.size ?? defaultPageSize
  const query = computed(() => ({
    page: page.value,
    size,
    sort: sort.value,
    direction: sort.value === null ? null : direction.value,
    search: one(asked.value.search),
    ...Object.fromEntries(names.map((name) => [name, filterFrom(name)])),
  }))
  /** Is anything set that could hide rows? Then an empty list should offer `clear`. */
  const narrowed = computed(
    () => one(asked.value.search) !== null || names.some((name) => filterFrom(name) !== (base[name] ?? null)),
  )

  return {
    page,
    sort,
    direction,
    size,
    search,
    filters,
    query,
    key: computed(() => JSON.stringify(query.value)),
    narrowed,
    goTo: (next: number) => write({ page: next > 1 ? String(next) : null }),
    sortBy: (column: string, next: Direction) => write({ sort: column, direction: next, page: null }),
    clear: () => {
      clearTimeout(pause)
      search.value = ''
      return write({ search: null, page: null, ...Object.fromEntries(names.map((name) => [name, null])) })
    },
  }
}

export type ListQuery = ReturnType<typeof useListQuery>
