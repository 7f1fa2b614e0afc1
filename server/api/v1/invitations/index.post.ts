import { inviteSchema } from '#shared/schemas/people'
import { defineRoute } from '../../../http/define-route'
import { invitePerson } from '../../../services/people/invite-person'

export default defineRoute({
  access: 'administrator',
  body: inviteSchema,
  status: 201,
  handler: ({ ctx, body }) => invitePerson(ctx, body),
})
