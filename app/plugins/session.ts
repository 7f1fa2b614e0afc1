import { useSessionStore } from '~/stores/session'

/** Asks once, in the server's render, who is signed in; the browser receives the answer with the page. */
export default defineNuxtPlugin({
  name: 'session',
  async setup() {
    if (import.meta.server) await useSessionStore().load()
  },
})
