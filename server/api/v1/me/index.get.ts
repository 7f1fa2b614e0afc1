import { defineRoute } from '../../../http/define-route'
import { meOf } from '../../../services/people/me-of'

export default defineRoute({
  access: 'public',
  handler: async ({ ctx }) => ({ me: ctx.actor ? await meOf(ctx) : null }),
})
