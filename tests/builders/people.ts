import type { z } from 'zod'
import { actingAs } from '../../server/context/context'
import type { Context } from '../../server/context/context'
import { getPerson, hasAnyPerson } from '../../server/repositories/person-repository'
import { createProgramme } from '../../server/services/programmes/create-programme'
import { acceptInvitation } from '../../server/services/people/accept-invitation'
import { actorOf } from '../../server/services/people/actor-of-session'
import { changeRoles } from '../../server/services/people/change-roles'
import { invitePerson } from '../../server/services/people/invite-person'
import { makeFirstAdministratorLink } from '../../server/services/people/make-first-administrator-link'
import { createProgrammeSchema } from '../../shared/schemas/targets'
import type { ProgrammeView } from '../../shared/schemas/targets'

export interface NewPerson {
  displayName: string
  /** Made from the name by default. */
  email?: string
  password?: string
  isObserver?: boolean
  isAdministrator?: boolean
  coordinatorOf?: string[]
}

export interface AddedPerson {
  id: string
  displayName: string
  email: string
  password: string
  /** Of the session that the invitation began. */
  sessionId: string
  /** Acting as this person, with the roles given here. */
  ctx: Context
}

/** Makes the first administrator by the one-time link, as the server's start does. */
export async function addFirstAdministrator({ ctx }: { ctx: Context }, person: NewPerson): Promise<AddedPerson> {
  const url = await makeFirstAdministratorLink(ctx)
  if (!url) throw new Error('There is somebody already; add people with addPerson.')
  return await accept(ctx, url, person)
}

/** Invites somebody and accepts for them; a house without people gets its keeper first. */
export async function addPerson(house: { ctx: Context }, person: NewPerson): Promise<AddedPerson> {
  const keeper = await keeperOf(house)
  const { isObserver = false, isAdministrator = false, coordinatorOf = [] } = person
  const { url } = await invitePerson(keeper, { isObserver, isAdministrator })
  const added = await accept(house.ctx, url, person)
  if (coordinatorOf.length === 0) return added
  await changeRoles(keeper, added.id, { isObserver, isAdministrator, coordinatorOf })
  return { ...added, ctx: await actingAsPerson(house.ctx, added.id) }
}

export async function addProgramme(house: { ctx: Context }, programme: z.input<typeof createProgrammeSchema>): Promise<ProgrammeView> {
  return await createProgramme(await keeperOf(house), createProgrammeSchema.parse(programme))
}

/** Acting as somebody with the roles that stand in the database now. */
export async function actingAsPerson(ctx: Context, personId: string): Promise<Context> {
  return actingAs(ctx, actorOf(await getPerson(ctx.reads, personId)))
}

async function keeperOf(house: { ctx: Context }): Promise<Context> {
  if (!await hasAnyPerson(house.ctx.reads)) await addFirstAdministrator(house, { displayName: 'Ada Keeper', email: 'keeper@example.org' })
  const keeper = await house.ctx.reads.selectFrom('person').select('id').where('is_administrator', '=', 1).orderBy('created_at').orderBy('id').limit(1).executeTakeFirstOrThrow()
  return await actingAsPerson(house.ctx, keeper.id)
}

async function accept(ctx: Context, url: string, person: NewPerson): Promise<AddedPerson> {
  const email = person.email ?? `${person.displayName.toLowerCase().replace(/[^a-z]+/g, '.')}@example.org`
  const password = person.password ?? 'a long enough password'
  const { me, sessionId } = await acceptInvitation(ctx, url.split('/').at(-1)!, { email, displayName: person.displayName, password })
  return { id: me.personId, displayName: me.displayName, email, password, sessionId, ctx: await actingAsPerson(ctx, me.personId) }
}
