import { readTargetQuerySchema } from '#shared/schemas/targets'
import { idParamsSchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../../http/define-route'
import { readTarget } from '../../../../services/targets/read-target'

export default defineRoute({
  access: 'signed-in',
  params: idParamsSchema,
  query: readTargetQuerySchema,
  handler: ({ ctx, params, query }) => readTarget(ctx, params.id, query.fit ?? null),
})
