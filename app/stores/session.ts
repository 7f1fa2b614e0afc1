import { defineStore } from 'pinia'
import type { Me } from '#shared/schemas/people'
import { useApi } from '~/composables/useApi'

/** Who is signed in, as the server last said; null for a visitor. */
export const useSessionStore = defineStore('session', () => {
  const me = ref<Me | null>(null)
  const isSignedIn = computed(() => me.value !== null)
  const isCoordinator = computed(() => (me.value?.coordinatorOf.length ?? 0) > 0)

  async function load() {
    me.value = (await useApi().get<{ me: Me | null }>('/me')).me
  }

  async function signIn(email: string, password: string) {
    me.value = (await useApi().post<{ me: Me }>('/session', { email, password })).me
  }

  async function signOut(where: 'here' | 'everywhere') {
    await useApi().remove(where === 'here' ? '/session' : '/sessions')
    me.value = null
  }

  return { me, isSignedIn, isCoordinator, load, signIn, signOut }
})
