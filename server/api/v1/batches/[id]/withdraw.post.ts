import { withdrawBatchSchema } from '#shared/schemas/batches'
import { idParamsSchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../../http/define-route'
import { withdrawBatch } from '../../../../services/batches/withdraw-batch'

export default defineRoute({
  access: 'observer',
  params: idParamsSchema,
  body: withdrawBatchSchema,
  handler: ({ ctx, params, body }) => withdrawBatch(ctx, { batchId: params.id, targetId: body.targetId }),
})
