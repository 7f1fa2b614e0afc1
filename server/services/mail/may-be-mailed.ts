import { isSilenced } from '../../repositories/mail-repository'
import { findPerson } from '../../repositories/person-repository'
import type { Tx } from '../../context/context'

/** Whether a person has an address and has not asked for silence, about this target or at all. */
export async function mayBeMailed(tx: Tx, personId: string, targetId: string): Promise<boolean> {
  const person = await findPerson(tx, personId)
  if (!person || person.state !== 'active' || person.email === null) return false
  return !await isSilenced(tx, personId, targetId)
}
