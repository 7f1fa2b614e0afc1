import { mailStopAddressSchema, stopMailSchema } from '#shared/schemas/mail'
import { defineRoute } from '../../../http/define-route'
import { readMailStop } from '../../../services/mail/read-mail-stop'
import { stopMail } from '../../../services/mail/stop-mail'

export default defineRoute({
  access: 'public',
  params: mailStopAddressSchema,
  body: stopMailSchema,
  handler: async ({ ctx, params, body }) => {
    await stopMail(ctx, params.token, body.scope)
    return readMailStop(ctx, params.token)
  },
})
