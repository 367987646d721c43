import { inject, onScopeDispose } from 'vue'
import { routerKey } from 'vue-router'
import { useConfirmStep } from '@/composables/useConfirmStep.ts'

interface Guard {
  dirty: () => boolean
  save: (() => Promise<void>) | null
}

const guards = new Set<Guard>()
let off = false

const dirtyGuards = () => (off ? [] : [...guards].filter((guard) => guard.dirty()))

window.addEventListener('beforeunload', (event) => {
  if (dirtyGuards().length > 0) event.preventDefault()
})

/** Another person takes over this browser: the page is left without a question. */
export const leaveWithoutAsking = () => {
  off = true
}

/** Saves what saves itself, then asks when something would still be lost. True: the page may be left. */
export async function mayLeave(confirm = useConfirmStep()): Promise<boolean> {
  await Promise.all(dirtyGuards().map((guard) => guard.save?.()))
  if (dirtyGuards().length === 0) return true
  return confirm({
    title: 'Leave without saving?',
    text: 'What you changed on this page is not saved. If you leave now, it is lost.',
    action: 'Leave without saving',
    keep: 'Stay on this page',
    danger: true,
  })
}

/**
 * Warns before unsaved work is lost, both inside the app and when the tab is closed. `save` is tried first where the
 * work saves itself. Changes of the query or the fragment alone do not leave the page.
 */
export function useLeaveGuard(dirty: () => boolean, save: (() => Promise<void>) | null = null): void {
  const guard: Guard = { dirty, save }
  guards.add(guard)
  const confirm = useConfirmStep()
  // Absent only where a component stands alone, without the app around it.
  const router = inject(routerKey, null)
  const stop = router?.beforeEach(async (to, from) => {
    // One question for the whole page, however many forms it holds.
    if (to.path === from.path || guards.values().next().value !== guard) return true
    return mayLeave(confirm)
  })
  onScopeDispose(() => {
    guards.delete(guard)
    stop?.()
  })
}
