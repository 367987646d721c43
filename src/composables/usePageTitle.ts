import { ref, watchEffect } from 'vue'

const name = ref<string>('')
const failed = ref<boolean>(false)
let pages = 0

watchEffect(() => {
  const words = name.value === '' ? 'Fanflower' : `${name.value} · Fanflower`
  document.title = failed.value ? `Error: ${words}` : words
})

/** Names the browser tab. */
export const nameTab = (words: string) => {
  name.value = words
}

/** The tab's name begins with 'Error:' while a form was refused. */
export const markTabFailed = (yes: boolean) => {
  failed.value = yes
}

/** Called by the router after each arrival at another page. */
export const arrive = (words: string) => {
  pages += 1
  failed.value = false
  name.value = words
}

/** False on the page the browser opened first. */
export const arrivedByNavigation = () => pages > 1
