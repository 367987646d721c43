import { onScopeDispose, watchEffect } from 'vue'
import { hands, type Hand } from '@shared/roles.ts'
import { themes, type Theme } from '@shared/users.ts'
import { useSessionStore } from '@/stores/session.ts'

const hintKey = 'fanflower.look'

interface Look {
  hand: Hand
  theme: Theme
}

/** What this device showed last, so that the sign-in page does not flash. The profile on the server is what counts. */
function lastLook(): Look {
  const [hand, theme] = (localStorage.getItem(hintKey) ?? '').split(' ')
  return {
    hand: hands.find((known) => known === hand) ?? 'left',
    theme: themes.find((known) => known === theme) ?? 'system',
  }
}

/** Puts the working hand and the theme of the signed-in person on the page, and follows the system's theme. */
export function useAppearance(): void {
  const session = useSessionStore()
  const systemDark = window.matchMedia('(prefers-color-scheme: dark)')

  const apply = () => {
    const { hand, theme } = session.user
      ? { hand: session.user.workingHand, theme: session.user.theme }
      : lastLook()
    if (session.user) localStorage.setItem(hintKey, `${hand} ${theme}`)
    const root = document.documentElement
    root.dataset.hand = hand
    root.classList.toggle('dark', theme === 'dark' || (theme === 'system' && systemDark.matches))
  }

  watchEffect(apply)
  systemDark.addEventListener('change', apply)
  onScopeDispose(() => systemDark.removeEventListener('change', apply))
}
