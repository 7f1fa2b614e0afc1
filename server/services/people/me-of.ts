import type { Me } from '#shared/schemas/people'
import { hasDesk } from '#shared/policies/coordinating'
import type { Context } from '../../context/context'
import { signInRequired } from '../../errors/app-error'
import { countFitsForDesk } from '../../repositories/fit-repository'
import { getPerson } from '../../repositories/person-repository'

/** The actor as their own page shows them. Throws sign-in-required for a visitor. */
export async function meOf(ctx: Context): Promise<Me> {
  const { actor } = ctx
  if (!actor) throw signInRequired()
  const person = await getPerson(ctx.reads, actor.personId)
  const deskCount = hasDesk(actor) ? await countFitsForDesk(ctx.reads, actor.coordinatorOf) : 0
  return { ...actor, displayName: person.display_name, email: person.email ?? '', deskCount }
}
