import { emptyBodySchema, idParamsSchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../../http/define-route'
import { sendBatch } from '../../../../services/batches/send-batch'

export default defineRoute({
  access: 'observer',
  params: idParamsSchema,
  body: emptyBodySchema,
  handler: ({ ctx, params }) => sendBatch(ctx, params.id),
})
