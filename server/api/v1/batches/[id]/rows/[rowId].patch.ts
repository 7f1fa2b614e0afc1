import { mendRowSchema, rowParamsSchema } from '#shared/schemas/batches'
import { defineRoute } from '../../../../../http/define-route'
import { mendRow } from '../../../../../services/batches/mend-row'

export default defineRoute({
  access: 'observer',
  params: rowParamsSchema,
  body: mendRowSchema,
  handler: ({ ctx, params, body }) => mendRow(ctx, { batchId: params.id, rowId: params.rowId, cells: body.cells }),
})
