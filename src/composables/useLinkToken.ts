import { ref, type Ref } from 'vue'

/**
 * The secret of an e-mailed link. It stands in the fragment, which browsers never send, and leaves the address bar and
 * the history at once: the next person at this computer must not find it there.
 */
export function useLinkToken(): Ref<string> {
  const token = decodeURIComponent(window.location.hash.replace(/^#(token=)?/, ''))
  window.history.replaceState(window.history.state, '', window.location.pathname)
  return ref<string>(token)
}
