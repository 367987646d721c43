// Every script a name may be written in; the browser fetches only the parts a page needs (unicode-range).
import '@fontsource/source-sans-3/400.css'
import '@fontsource/source-sans-3/600.css'
import 'primeicons/primeicons.css'
import '@/assets/base.css'
import { PiniaColada } from '@pinia/colada'
import { createPinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { createApp } from 'vue'
import App from '@/App.vue'
import { locale, theme } from '@/assets/theme.ts'
import { router } from '@/router/index.ts'

// The server writes a new nonce into every page it sends; without it the browser refuses PrimeVue's styles.
const nonce = document.querySelector<HTMLMetaElement>('meta[name="csp-nonce"]')?.content

// A page taken back out of the browser's memory may show somebody who has signed out since.
window.addEventListener('pageshow', (event) => {
  if (event.persisted) window.location.reload()
})

createApp(App)
  .use(createPinia())
  // A refetch on every change of window would fill the access history with reads nobody made.
  .use(PiniaColada, { queryOptions: { staleTime: 10_000, refetchOnWindowFocus: false } })
  .use(PrimeVue, {
    theme: {
      preset: theme,
      options: {
        darkModeSelector: '.dark',
        cssLayer: { name: 'primevue', order: 'reset, primevue, app' },
      },
    },
    locale,
    csp: { nonce },
  })
  .use(router)
  .mount('#app')
