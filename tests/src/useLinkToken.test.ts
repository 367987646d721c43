import { afterEach, describe, expect, it } from 'vitest'
import { useLinkToken } from '@/composables/useLinkToken.ts'

afterEach(() => window.history.replaceState(null, '', '/'))

describe('the secret of a link', () => {
  it.each([
    ['#Zm9vYmFy-_', 'Zm9vYmFy-_'],
    ['#token=Zm9vYmFy', 'Zm9vYmFy'],
    ['', ''],
    ['#%E0%A4%A', ''],
  ])('in %j is %j, and leaves the address bar', (fragment, token) => {
    window.history.replaceState(null, '', `/answer${fragment}`)
    expect(useLinkToken().value).toBe(token)
    expect(window.location.href).toMatch(/\/answer$/)
  })
})
