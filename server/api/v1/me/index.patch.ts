import { changeNameSchema } from '#shared/schemas/people'
import { defineRoute } from '../../../http/define-route'
import { meOf } from '../../../services/people/me-of'
import { renameMe } from '../../../services/people/rename-me'

export default defineRoute({
  access: 'signed-in',
  body: changeNameSchema,
  async handler({ ctx, body }) {
    await renameMe(ctx, body.displayName)
    return { me: await meOf(ctx) }
  },
})
