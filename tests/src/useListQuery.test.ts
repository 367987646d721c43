import { flushPromises } from '@vue/test-utils'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { useListQuery } from '../../src/composables/useListQuery.ts'
import { inPage } from '../support/mounted.ts'

const openList = (address = '/here') =>
  inPage(
    () =>
      useListQuery({
        sort: 'name',
        filters: { status: 'open' as string | null, school: null as string | null },
      }),
    address,
  )

beforeEach(() => {
  vi.useFakeTimers()
})
afterEach(() => {
  vi.useRealTimers()
})

describe('useListQuery', () => {
  it('asks for the first page in the usual order when the address says nothing', async () => {
    const { result: list } = await openList()
    expect(list.query.value).toEqual({
      page: 1,
      size: 25,
      sort: 'name',
      direction: 'asc',
      search: null,
      status: 'open',
      school: null,
    })
    expect(list.narrowed.value).toBe(false)
  })

  it('takes page, order, search and filters from the address', async () => {
    const { result: list } = await openList('/here?page=3&sort=age&direction=desc&search=hale&school=s1')
    expect(list.query.value).toMatchObject({
      page: 3,
      sort: 'age',
      direction: 'desc',
      search: 'hale',
      status: 'open',
      school: 's1',
    })
    expect(list.search.value).toBe('hale')
    expect(list.filters.school).toBe('s1')
    expect(list.narrowed.value).toBe(true)
  })

  it.each(['0', '-2', '1.5', 'two', ''])(
    'reads page %j of a hand-written address as the first',
    async (page) => {
      const { result: list } = await openList(`/here?page=${page}`)
      expect(list.page.value).toBe(1)
    },
  )

  it('writes a page and an order into the address, and starts again from page 1 in a new order', async () => {
    const { result: list, router } = await openList()
    await list.goTo(4)
    expect(router.currentRoute.value.query).toEqual({ page: '4' })
    expect(list.query.value.page).toBe(4)
    await list.sortBy('age', 'desc')
    expect(router.currentRoute.value.query).toEqual({ sort: 'age', direction: 'desc' })
    expect(list.query.value.page).toBe(1)
  })

  it('shows typed words at once but asks only after a pause, from page 1', async () => {
    const { result: list } = await openList('/here?page=2')
    list.search.value = 'ha'
    await flushPromises()
    list.search.value = 'hale '
    await flushPromises()
    expect(list.query.value).toMatchObject({ search: null, page: 2 })
    await vi.advanceTimersByTimeAsync(400)
    expect(list.query.value).toMatchObject({ search: 'hale', page: 1 })
    expect(list.search.value).toBe('hale ')
  })

  it('keeps a filter that was switched off apart from one that was never set', async () => {
    const { result: list, router } = await openList()
    list.filters.status = null
    await flushPromises()
    expect(router.currentRoute.value.query).toEqual({ status: '' })
    expect(list.query.value).toMatchObject({ status: null })
    list.filters.status = 'open'
    await flushPromises()
    expect(router.currentRoute.value.query).toEqual({})
  })

  it('clears search and filters to what the list starts with', async () => {
    const { result: list, router } = await openList('/here?search=hale&status=closed&page=2&sort=age')
    await list.clear()
    expect(router.currentRoute.value.query).toEqual({ sort: 'age' })
    expect(list.query.value).toMatchObject({ search: null, status: 'open', page: 1 })
    expect(list.search.value).toBe('')
    expect(list.filters.status).toBe('open')
  })

  it('follows the browser’s way back', async () => {
    const { result: list, router } = await openList()
    await router.push('/here?status=closed&search=bell')
    expect(list.filters.status).toBe('closed')
    expect(list.search.value).toBe('bell')
    router.back()
    await flushPromises()
    expect(list.filters.status).toBe('open')
    expect(list.search.value).toBe('')
  })

  it('does not ask for anything new while another page is opened', async () => {
    const { result: list, router } = await openList('/here?page=3')
    await router.push('/elsewhere')
    expect(list.query.value.page).toBe(3)
  })

  it('lets somebody go who types and opens a row at once, also when that page takes a while to load', async () => {
    const { result: list, router } = await openList()
    router.beforeEach((to) => (to.path === '/elsewhere' ? new Promise((go) => setTimeout(go, 1000)) : true))
    list.search.value = 'hale'
    await flushPromises()
    const gone = router.push('/elsewhere')
    await vi.advanceTimersByTimeAsync(1000)
    await gone
    expect(router.currentRoute.value.fullPath).toBe('/elsewhere')
  })
})
