import { idParamsSchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../../http/define-route'
import { readBatch } from '../../../../services/batches/read-batch'

export default defineRoute({
  access: 'signed-in',
  params: idParamsSchema,
  handler: ({ ctx, params }) => readBatch(ctx, params.id),
})
