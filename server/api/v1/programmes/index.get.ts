import { pageQuerySchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../http/define-route'
import { listProgrammes } from '../../../services/programmes/list-programmes'

export default defineRoute({
  access: 'public',
  query: pageQuerySchema,
  handler: ({ ctx, query }) => listProgrammes(ctx, query),
})
