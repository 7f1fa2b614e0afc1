import { recordAudit } from '../../audit/record-audit'
import { withTransaction } from '../../context/context'
import type { Context } from '../../context/context'
import { signInRequired } from '../../errors/app-error'
import { updatePerson } from '../../repositories/person-repository'

/** Changes the name the actor is shown under; the observer credited with measures keeps its name. Open to whoever is signed in; records person.renamed. */
export async function renameMe(ctx: Context, displayName: string): Promise<void> {
  if (!ctx.actor) throw signInRequired()
  const { personId } = ctx.actor
  await withTransaction(ctx, async (tx) => {
    await updatePerson(tx, personId, { display_name: displayName })
    await recordAudit(tx, ctx, { event: 'person.renamed', subjectKind: 'person', subjectId: personId, detail: {} })
  })
}
