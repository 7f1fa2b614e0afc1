import type { InvitationView } from '#shared/schemas/people'

/** What an invitation gives, in a sentence for the invited person. */
export function rolesSentence({ isObserver, isAdministrator, coordinatorOf }: Pick<InvitationView, 'isObserver' | 'isAdministrator' | 'coordinatorOf'>): string {
  const roles = [isObserver && 'an observer', coordinatorOf && 'a coordinator', isAdministrator && 'an administrator'].filter(Boolean) as string[]
  if (roles.length === 0) return 'As a member you read fits and sheets, and follow targets.'
  const list = roles.length === 1 ? roles[0] : `${roles.slice(0, -1).join(', ')} and ${roles.at(-1)}`
  return `The account is that of ${list}.`
}
