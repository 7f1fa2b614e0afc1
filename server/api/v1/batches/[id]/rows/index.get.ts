import { idParamsSchema, pageQuerySchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../../../http/define-route'
import { listRowsOfBatch } from '../../../../../services/batches/read-batch'

export default defineRoute({
  access: 'signed-in',
  params: idParamsSchema,
  query: pageQuerySchema,
  handler: ({ ctx, params, query }) => listRowsOfBatch(ctx, params.id, query),
})
