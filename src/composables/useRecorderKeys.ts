import { onScopeDispose, ref } from 'vue'
import { findKeyOn } from '@/composables/useFindKey.ts'

/** A field keeps its keys; buttons and links keep Enter and the space bar. */
const fieldSelector = 'input, textarea, select, [role="combobox"], [role="listbox"], [contenteditable="true"]'
const pressable = 'button, a[href], summary'

const within = (target: EventTarget | null, selector: string) =>
  target instanceof Element && target.closest(selector) !== null

interface RecorderKeys {
  /** Lower-case key ('l', ' ') to what it does. */
  keys: Record<string, () => void>
  /** False while the keys rest, e.g. once everything is recorded. */
  enabled?: () => boolean
  /** An element whose own space bar means the same as ours. */
  main?: () => HTMLElement | null
}

/**
 * Single keys of a recorder. They count only while no field has the focus, no question is open and no modifier is held,
 * and every other key is left alone. `on` switches them off: speech input and slipping fingers press them too
 * (WCAG 2.2, 2.1.4); whoever has switched off the key of Find a child starts without.
 */
export function useRecorderKeys({ keys, enabled = () => true, main = () => null }: RecorderKeys) {
  const on = ref<boolean>(findKeyOn.value)
  let swallowed = false

  const isMine = (event: KeyboardEvent) => {
    if (!on.value || !enabled() || event.defaultPrevented) return false
    if (event.ctrlKey || event.metaKey || event.altKey) return false
    if (within(event.target, fieldSelector) || document.querySelector('dialog[open]')) return false
    const key = event.key.toLowerCase()
    if (!Object.hasOwn(keys, key)) return false
    const button = main()
    const isMain = button !== null && event.target instanceof Node && button.contains(event.target)
    return key !== ' ' || isMain || !within(event.target, pressable)
  }

  const pressed = (event: KeyboardEvent) => {
    if (!isMine(event)) return
    event.preventDefault()
    swallowed = event.key === ' '
    // A key that is held down is one press.
    if (!event.repeat) keys[event.key.toLowerCase()]?.()
  }
  // A button is pressed by the space bar when it is let go: that press has counted already.
  const released = (event: KeyboardEvent) => {
    if (event.key !== ' ' || !swallowed) return
    event.preventDefault()
    swallowed = false
  }
  window.addEventListener('keydown', pressed)
  window.addEventListener('keyup', released)
  onScopeDispose(() => {
    window.removeEventListener('keydown', pressed)
    window.removeEventListener('keyup', released)
  })
  return { on }
}
