import { pageQuerySchema } from '#shared/schemas/ids'
import { defineRoute } from '../../http/define-route'
import { listAuditEvents } from '../../services/people/list-audit-events'

export default defineRoute({
  access: 'administrator',
  query: pageQuerySchema,
  handler: ({ ctx, query }) => listAuditEvents(ctx, query),
})
