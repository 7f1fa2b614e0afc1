import { mailStopAddressSchema } from '#shared/schemas/mail'
import { defineRoute } from '../../../http/define-route'
import { readMailStop } from '../../../services/mail/read-mail-stop'

export default defineRoute({
  access: 'public',
  params: mailStopAddressSchema,
  handler: ({ ctx, params }) => readMailStop(ctx, params.token),
})
