import { defineStore } from 'pinia'
import { computed, ref } from 'vue'
import { hasDesk } from '#shared/policies/coordinating'
import { mayUpload } from '#shared/policies/uploading'
import type { Me } from '#shared/schemas/people'
import { useApi } from '~/composables/useApi'

/** Who is signed in, as the server last said; null for a visitor. */
export const useSessionStore = defineStore('session', () => {
  const me = ref<Me | null>(null)
  const isSignedIn = computed(() => me.value !== null)
  const isCoordinator = computed(() => hasDesk(me.value))
  const isObserver = computed(() => mayUpload(me.value))

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

  return { me, isSignedIn, isCoordinator, isObserver, load, signIn, signOut }
})
