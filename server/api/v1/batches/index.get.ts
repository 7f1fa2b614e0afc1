import { listBatchesQuerySchema } from '#shared/schemas/batches'
import { defineRoute } from '../../../http/define-route'
import { listBatches } from '../../../services/batches/list-batches'

export default defineRoute({
  access: 'signed-in',
  query: listBatchesQuerySchema,
  handler: ({ ctx, query }) => listBatches(ctx, { isMineOnly: query.mine === '1', cursor: query.cursor, limit: query.limit }),
})
