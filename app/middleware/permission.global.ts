import { mayAdminister } from '#shared/policies/administering'
import { hasDesk } from '#shared/policies/coordinating'
import { useSessionStore } from '~/stores/session'

declare module '#app' {
  interface PageMeta {
    /** Who may open the page; without it, everybody. */
    needs?: 'signed-in' | 'coordinator' | 'administrator'
  }
}

/** Sends a visitor to the sign-in page and back; answers "not found" to a person whose roles do not reach. The API decides again on every call. */
export default defineNuxtRouteMiddleware((to) => {
  const needs = to.meta.needs
  if (!needs) return
  const { me } = useSessionStore()
  if (!me) return navigateTo({ path: '/sign-in', query: { next: to.fullPath } })
  const reaches = { 'signed-in': true, 'coordinator': hasDesk(me), 'administrator': mayAdminister(me) }
  if (!reaches[needs]) return abortNavigation(createError({ statusCode: 404, statusMessage: 'Not found, or not open to you', fatal: true }))
})
