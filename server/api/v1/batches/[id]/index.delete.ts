import { idParamsSchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../../http/define-route'
import { discardBatch } from '../../../../services/batches/discard-batch'

export default defineRoute({
  access: 'observer',
  params: idParamsSchema,
  handler: ({ ctx, params }) => discardBatch(ctx, params.id),
})
