import type { Context } from '../../context/context'
import { hasAnyPerson } from '../../repositories/person-repository'

/** Whether the database answers, for a proxy that sends requests here. Open to everybody; throws what the database throws. */
export async function checkReadiness(ctx: Context): Promise<{ status: 'ready' }> {
  await hasAnyPerson(ctx.reads)
  return { status: 'ready' }
}
