import { onScopeDispose, ref, watch } from 'vue'

const settingKey = 'fanflower.findKey'
/** `/` for the right hand, the key left of 1 for the left: neither hand has to cross the keyboard. */
const keys = ['/', '`']

/**
 * Single keys that open Find a child can be switched off on this device: speech input and slipping fingers press them
 * too (WCAG 2.2, 2.1.4).
 */
const on = ref<boolean>(localStorage.getItem(settingKey) !== 'off')
watch(on, (yes) => {
  if (yes) localStorage.removeItem(settingKey)
  else localStorage.setItem(settingKey, 'off')
})
export const findKeyOn = on

const isTyping = (target: EventTarget | null) =>
  target instanceof HTMLElement &&
  (target.isContentEditable || target.closest('input, textarea, select, [role="combobox"]') !== null)

/** Calls `open` when one of the keys is pressed outside of any field. */
export function useFindKey(open: () => void): void {
  const pressed = (event: KeyboardEvent) => {
    if (!on.value || !keys.includes(event.key) || event.ctrlKey || event.metaKey || event.altKey) return
    if (event.defaultPrevented || isTyping(event.target) || document.querySelector('dialog[open]')) return
    event.preventDefault()
    open()
  }
  window.addEventListener('keydown', pressed)
  onScopeDispose(() => window.removeEventListener('keydown', pressed))
}
