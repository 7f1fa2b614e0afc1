import { listTargetsQuerySchema } from '#shared/schemas/targets'
import { defineRoute } from '../../../http/define-route'
import { listTargets } from '../../../services/targets/list-targets'

export default defineRoute({
  access: 'signed-in',
  query: listTargetsQuerySchema,
  handler: ({ ctx, query }) => listTargets(ctx, query),
})
