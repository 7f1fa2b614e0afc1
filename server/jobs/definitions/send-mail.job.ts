import { giveUpMail, sendMail } from '../../services/mail/send-mail'
import { sendMailSchema } from '../contracts/send-mail'
import { defineJob } from '../runner/job-definition'

/** Sends one letter of the outbox through the transport of this installation. */
export const sendMailJob = defineJob({
  name: 'send-mail',
  schema: sendMailSchema,
  async handle(ctx, { mailId }, lease, { mailTransport }) {
    await sendMail(ctx, mailTransport, mailId, lease)
  },
  async onDead(tx, ctx, { mailId }, reason) {
    await giveUpMail(tx, ctx, mailId, reason)
  },
})
