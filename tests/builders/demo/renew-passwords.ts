import { withTransaction } from '../../../server/context/context'
import type { Context } from '../../../server/context/context'
import { findPersonByEmail, updatePerson } from '../../../server/repositories/person-repository'
import { demoSignIns } from './cast'
import type { DemoSignIn } from './cast'

/** Gives the people of a filled demo these passwords. No service does that for others, and it is done only while no server runs. */
export async function renewPasswords(ctx: Context, passwords: readonly string[]): Promise<DemoSignIn[]> {
  const signIns = demoSignIns(passwords)
  for (const { email, password } of signIns) {
    const person = await findPersonByEmail(ctx.reads, email)
    if (!person) throw new Error(`${email} is not in this database; remove its folder, and the demo is filled anew.`)
    const password_hash = await ctx.passwords.hash(password)
    await withTransaction(ctx, tx => updatePerson(tx, person.id, { password_hash }))
  }
  return signIns
}
