/**
 * node scripts/run-bundled.mjs tests/builders/fill-demo.ts FOLDER BASE_URL story|passwords, with { passwords: [...] } as JSON
 * on standard input. "story" fills an empty folder through the services; "passwords" gives the people of a filled one new
 * passwords. Prints the sign-ins as JSON.
 */
import { text } from 'node:stream/consumers'
import { recordAudit } from '../../server/audit/record-audit'
import { withTransaction } from '../../server/context/context'
import type { Context } from '../../server/context/context'
import { findPersonByEmail, updatePerson } from '../../server/repositories/person-repository'
import { revokeSessionsOf } from '../../server/repositories/session-repository'
import { demoSignIns } from './demo/cast'
import { STORY_BEGINS, fillDemo } from './demo/demo-story'
import { openHouseAt } from './house-at'

async function renewPasswords(ctx: Context, passwords: string[]) {
  const signIns = demoSignIns(passwords)
  for (const { email, password } of signIns) {
    const hash = await ctx.passwords.hash(password)
    await withTransaction(ctx, async (tx) => {
      const person = await findPersonByEmail(tx, email)
      if (!person) throw new Error(`The demo has nobody with the address ${email}: delete its data folder and start it again.`)
      await updatePerson(tx, person.id, { password_hash: hash })
      const sessionsEnded = await revokeSessionsOf(tx, person.id, ctx.clock.now())
      await recordAudit(tx, ctx, { event: 'password.changed', subjectKind: 'person', subjectId: person.id, detail: { sessionsEnded } })
    })
  }
  return signIns
}

const [dataDir, baseUrl, what] = process.argv.slice(2)
if (!dataDir || !baseUrl || (what !== 'story' && what !== 'passwords')) throw new Error('Use: fill-demo FOLDER BASE_URL story|passwords')
const { passwords } = JSON.parse(await text(process.stdin)) as { passwords: string[] }
const house = await openHouseAt({ dataDir, baseUrl, startAt: what === 'story' ? STORY_BEGINS : new Date().toISOString() })
const signIns = what === 'story' ? (await fillDemo({ house, passwords })).signIns : await renewPasswords(house.ctx, passwords)
await house.close()
process.stdout.write(JSON.stringify(signIns))
