import { idParamsSchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../../http/define-route'
import { followTarget } from '../../../../services/targets/follow-target'

export default defineRoute({
  access: 'signed-in',
  params: idParamsSchema,
  handler: ({ ctx, params }) => followTarget(ctx, params.id),
})
