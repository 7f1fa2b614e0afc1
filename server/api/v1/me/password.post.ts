import { changePasswordSchema } from '#shared/schemas/people'
import { defineRoute } from '../../../http/define-route'
import { sessionIdOf } from '../../../http/session'
import { changePassword } from '../../../services/people/change-password'

export default defineRoute({
  access: 'signed-in',
  body: changePasswordSchema,
  handler: ({ ctx, body, event }) => changePassword(ctx, body, sessionIdOf(event)),
})
