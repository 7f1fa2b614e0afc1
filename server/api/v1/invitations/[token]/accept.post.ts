import { acceptInvitationSchema, invitationParamsSchema } from '#shared/schemas/people'
import { defineRoute } from '../../../../http/define-route'
import { keepSession } from '../../../../http/session'
import { acceptInvitation } from '../../../../services/people/accept-invitation'

export default defineRoute({
  access: 'public',
  params: invitationParamsSchema,
  body: acceptInvitationSchema,
  async handler({ ctx, params, body, event }) {
    const { me, sessionId } = await acceptInvitation(ctx, params.token, body)
    await keepSession(event, sessionId)
    return { me }
  },
})
