import type { Actor } from '../schemas/people'

/** People, invitations, roles, programmes and the audit list. */
export function mayAdminister(actor: Actor | null): boolean {
  return actor?.isAdministrator === true
}

/** E-mail addresses are open to oneself and the administrator. */
export function mayReadEmail(actor: Actor | null, personId: string): boolean {
  return actor !== null && (actor.isAdministrator || actor.personId === personId)
}
