import { nameKey } from '#shared/intake/name-key'
import type { Context, Reads, Tx } from '../../context/context'
import { findObserverByNameKey, findObserverOfPerson, insertObserver } from '../../repositories/observer-repository'
import { getPerson } from '../../repositories/person-repository'

/**
 * Under what name a person's own measures are credited: the observer tied to the account, else the name of the account, with a
 * number where another observer bears it: whose measures those are is not for a namesake to claim.
 */
export async function ownObserverName(reads: Reads, personId: string): Promise<string> {
  const own = await findObserverOfPerson(reads, personId)
  if (own) return own.name
  const { display_name } = await getPerson(reads, personId)
  for (let count = 1; ; count++) {
    const name = count === 1 ? display_name : `${display_name} (${count})`
    const taken = await findObserverByNameKey(reads, nameKey(name))
    if (!taken) return name
  }
}

/**
 * Finds or makes the observers of these names, in the caller's transaction, and answers their ids by name key. An observer made
 * under the person's own name is tied to the account; others have none.
 */
export async function creditObservers(tx: Tx, ctx: Context, { personId, names }: { personId: string; names: Iterable<string> }): Promise<Map<string, string>> {
  const ownKey = nameKey(await ownObserverName(tx, personId))
  const idByKey = new Map<string, string>()
  for (const name of names) {
    const key = nameKey(name)
    if (idByKey.has(key)) continue
    const known = await findObserverByNameKey(tx, key)
    const id = known?.id ?? ctx.ids.newId()
    if (!known) {
      await insertObserver(tx, { id, name: name.trim(), name_key: key, person_id: key === ownKey ? personId : null, created_at: ctx.clock.now() })
    }
    idByKey.set(key, id)
  }
  return idByKey
}
