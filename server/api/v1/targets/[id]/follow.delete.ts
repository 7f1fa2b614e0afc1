import { idParamsSchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../../http/define-route'
import { unfollowTarget } from '../../../../services/targets/follow-target'

export default defineRoute({
  access: 'signed-in',
  params: idParamsSchema,
  handler: ({ ctx, params }) => unfollowTarget(ctx, params.id),
})
