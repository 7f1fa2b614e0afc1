import { chooseTargetSchema } from '#shared/schemas/batches'
import { idParamsSchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../../http/define-route'
import { chooseTarget } from '../../../../services/batches/choose-target'

export default defineRoute({
  access: 'observer',
  params: idParamsSchema,
  body: chooseTargetSchema,
  handler: ({ ctx, params, body }) => chooseTarget(ctx, { batchId: params.id, targetId: body.targetId }),
})
