import { orbitsQuerySchema } from '#shared/schemas/editions'
import { defineRoute } from '../../../http/define-route'
import { listEditions } from '../../../services/editions/list-editions'

export default defineRoute({
  access: 'public',
  query: orbitsQuerySchema,
  handler: ({ ctx, query }) => listEditions(ctx, query),
})
