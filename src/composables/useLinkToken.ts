import { ref, type Ref } from 'vue'

/** The fragment as it was sent; empty where a mail program has spoilt it, which the pages tell as a link that is not whole. */
const readFragment = (fragment: string): string => {
  try {
    return decodeURIComponent(fragment)
  } catch {
    return ''
  }
}

/**
 * The secret of an e-mailed link. It stands in the fragment, which browsers never send, and leaves the address bar and
 * the history at once: the next person at this computer must not find it there.
 */
export function useLinkToken(): Ref<string> {
  const token = readFragment(window.location.hash.replace(/^#(token=)?/, ''))
  window.history.replaceState(window.history.state, '', window.location.pathname)
  return ref<string>(token)
}
