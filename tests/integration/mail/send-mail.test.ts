import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { headerOf, readMessage } from '../../../scripts/mailbox/read-message.mjs'
import { withTransaction } from '../../../server/context/context'
import { sendMailJob } from '../../../server/jobs/definitions/send-mail.job'
import { runJobsUntilIdle } from '../../../server/jobs/runner/run-until-idle'
import { MailRefusedError } from '../../../server/mail/outbox/mail-transport'
import type { MailTransport } from '../../../server/mail/outbox/mail-transport'
import { queueMail } from '../../../server/mail/outbox/queue-mail'
import { createCollectingTransport } from '../../../server/mail/transports/collecting-transport'
import { stopMail } from '../../../server/services/mail/stop-mail'
import { addPerson } from '../../builders/people'
import type { AddedPerson } from '../../builders/people'
import { createTestHouse } from '../../builders/test-house'
import type { TestHouse } from '../../builders/test-house'

let house: TestHouse
let reader: AddedPerson
beforeEach(async () => {
  house = await createTestHouse()
  reader = await addPerson(house, { displayName: 'Wenna Ashgrove' })
})
afterEach(() => house.close())

const queue = (dedupeKey = 'one') => withTransaction(house.ctx, tx => queueMail(tx, house.ctx, {
  personId: reader.id, template: 'edition-published', dedupeKey, subject: 'Linden 12 AB', bodyText: 'It is published.\n', canUnsubscribe: true,
}))
const run = (mailTransport: MailTransport | null) => runJobsUntilIdle(house.ctx, {
  definitions: [sendMailJob],
  tools: { mailTransport, computeFit: async () => { throw new Error('no fit is asked for here') } },
})
const letters = () => house.database.reads.selectFrom('mail_out').selectAll().orderBy('created_at').orderBy('dedupe_key').execute()
const failing = (error: Error): MailTransport & { tries: number } => {
  const transport = { tries: 0, send: async () => { transport.tries += 1; throw error } }
  return transport
}
const HOUR_MS = 3_600_000

describe('a letter in the outbox', () => {
  it('is sent once to the address of its reader, and the sending is recorded', async () => {
    const transport = createCollectingTransport()
    const { mailId } = await queue()
    await run(transport)
    await run(transport)
    expect(transport.collected).toHaveLength(1)
    expect(transport.collected[0]).toMatchObject({ to: reader.email, subject: 'Linden 12 AB' })
    expect(await letters()).toMatchObject([{ state: 'sent', attempts: 1, sent_at: house.clock.now(), last_error: null }])
    const audit = await house.database.reads.selectFrom('audit_event').selectAll().where('event', '=', 'mail.sent').execute()
    expect(audit).toMatchObject([{ actor_kind: 'system', subject_id: mailId }])
  })

  it('is not written twice under one key', async () => {
    await queue()
    expect(await queue()).toMatchObject({ isNew: false })
    expect(await letters()).toHaveLength(1)
  })

  it('is not there, nor its job, where the change it tells of was rolled back', async () => {
    await expect(withTransaction(house.ctx, async (tx) => {
      await queueMail(tx, house.ctx, { personId: reader.id, template: 'edition-published', dedupeKey: 'x', subject: 's', bodyText: 'b', canUnsubscribe: true })
      throw new Error('no edition after all')
    })).rejects.toThrow('no edition after all')
    expect(await letters()).toEqual([])
    expect(await run(createCollectingTransport())).toBe(0)
  })

  it('ends with the link that stops such mail, of which only the hash is kept afterwards', async () => {
    const transport = createCollectingTransport()
    await queue()
    const [waiting] = await letters()
    const url = waiting!.unsubscribe_url!
    await run(transport)
    const message = readMessage(Buffer.from(transport.collected[0]!.source))
    expect(message.text).toContain(url)
    expect(headerOf(message, 'list-unsubscribe')).toBe(`<${url}>`)
    const [sent] = await letters()
    expect(sent).toMatchObject({ unsubscribe_url: null, unsubscribe_hash: waiting!.unsubscribe_hash })
    expect(JSON.stringify(sent)).not.toContain(url.split('/').at(-1)!)
  })
})

describe('a letter that cannot be handed over', () => {
  it('is tried again later under the same Message-ID, and arrives when the server is back', async () => {
    const { mailId } = await queue()
    await run(failing(new Error('connection refused')))
    expect(await letters()).toMatchObject([{ state: 'queued', attempts: 1, last_error: 'connection refused' }])
    const transport = createCollectingTransport()
    expect(await run(transport)).toBe(0)
    house.clock.advance(HOUR_MS)
    await run(transport)
    expect(transport.collected.map(mail => mail.messageId)).toEqual([`<${mailId}@127.0.0.1>`])
    expect(await letters()).toMatchObject([{ state: 'sent', attempts: 2 }])
  })

  it('is given up after the last try, with the reason kept and recorded', async () => {
    await queue()
    const transport = failing(new MailRefusedError('RCPT TO was answered 450 busy', { isPermanent: false }))
    for (let k = 0; k < 12; k++) {
      await run(transport)
      house.clock.advance(24 * HOUR_MS)
    }
    expect(transport.tries).toBe(5)
    expect(await letters()).toMatchObject([{ state: 'dead', attempts: 5, last_error: 'RCPT TO was answered 450 busy', unsubscribe_url: null }])
    const audit = await house.database.reads.selectFrom('audit_event').select('detail').where('event', '=', 'mail.dead').execute()
    expect(audit.map(row => JSON.parse(row.detail))).toEqual([{ template: 'edition-published', attempts: 5 }])
  })

  it('is given up at once where the address does not exist, and the log of jobs holds no address', async () => {
    await queue()
    const transport = failing(new MailRefusedError(`RCPT TO was answered 550 no such user ${reader.email}`, { isPermanent: true }))
    await run(transport)
    house.clock.advance(24 * HOUR_MS)
    await run(transport)
    expect(transport.tries).toBe(1)
    expect(await letters()).toMatchObject([{ state: 'dead', attempts: 1 }])
    const [job] = await house.database.reads.selectFrom('job').selectAll().where('name', '=', 'send-mail').execute()
    expect(job).toMatchObject({ state: 'dead' })
    expect(job!.last_error).not.toContain(reader.email)
  })

  it('stays in the outbox as not sent where this installation sends no mail', async () => {
    await queue()
    await run(null)
    expect(await letters()).toMatchObject([{ state: 'stopped', last_error: expect.stringContaining('SEMILATUS_MAIL') }])
  })
})

describe('a reader who asked for silence', () => {
  it('gets nothing that waited, and the asking is recorded as theirs', async () => {
    const transport = createCollectingTransport()
    await queue('first')
    const token = (await letters())[0]!.unsubscribe_url!.split('/').at(-1)!
    await run(transport)
    await queue('second')
    await stopMail(house.ctx, token, 'all')
    await run(transport)
    expect(transport.collected).toHaveLength(1)
    expect((await letters()).map(letter => letter.state).sort()).toEqual(['sent', 'stopped'])
    const audit = await house.database.reads.selectFrom('audit_event').selectAll().where('event', '=', 'mail.stopped').execute()
    expect(audit).toMatchObject([{ actor_id: reader.id, subject_kind: 'person', subject_id: reader.id }])
  })

  it('may follow the link again without harm, and a link that no letter carries is not found', async () => {
    await queue()
    const token = (await letters())[0]!.unsubscribe_url!.split('/').at(-1)!
    await stopMail(house.ctx, token, 'all')
    await stopMail(house.ctx, token, 'all')
    expect(await house.database.reads.selectFrom('mail_stop').selectAll().execute()).toHaveLength(1)
    await expect(stopMail(house.ctx, 'a'.repeat(52), 'all')).rejects.toMatchObject({ code: 'not-found' })
  })
})
