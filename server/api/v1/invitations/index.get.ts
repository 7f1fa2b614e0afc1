import { pageQuerySchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../http/define-route'
import { listInvitations } from '../../../services/people/list-invitations'

export default defineRoute({
  access: 'administrator',
  query: pageQuerySchema,
  handler: ({ ctx, query }) => listInvitations(ctx, query),
})
