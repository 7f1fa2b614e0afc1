import { invitationParamsSchema } from '#shared/schemas/people'
import { defineRoute } from '../../../../http/define-route'
import { readInvitation } from '../../../../services/people/read-invitation'

export default defineRoute({
  access: 'public',
  params: invitationParamsSchema,
  handler: async ({ ctx, params }) => ({ invitation: await readInvitation(ctx, params.token) }),
})
