import { defineRoute } from '../../http/define-route'
import { listDesk } from '../../services/desk/list-desk'

export default defineRoute({
  access: 'coordinator',
  handler: async ({ ctx }) => ({ items: await listDesk(ctx) }),
})
