import { mailStopAddressSchema } from '#shared/schemas/mail'
import { defineRoute } from '../../http/define-route'
import { readMailStop } from '../../services/mail/read-mail-stop'
import { stopMail } from '../../services/mail/stop-mail'

// RFC 8058: a mail program posts here by one click, with a form of one fixed line that says nothing more than the post itself.
export default defineRoute({
  access: 'public',
  params: mailStopAddressSchema,
  handler: async ({ ctx, params }) => {
    await stopMail(ctx, params.token, 'target')
    return readMailStop(ctx, params.token)
  },
})
