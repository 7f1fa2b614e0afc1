import { createTargetSchema } from '#shared/schemas/targets'
import { defineRoute } from '../../../http/define-route'
import { createTarget } from '../../../services/targets/create-target'

export default defineRoute({
  access: 'coordinator',
  body: createTargetSchema,
  status: 201,
  handler: ({ ctx, body }) => createTarget(ctx, body),
})
