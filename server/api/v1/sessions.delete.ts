import { defineRoute } from '../../http/define-route'
import { forgetSession } from '../../http/session'
import { signOutEverywhere } from '../../services/people/sign-out'

export default defineRoute({
  access: 'signed-in',
  async handler({ ctx, event }) {
    await signOutEverywhere(ctx)
    await forgetSession(event)
  },
})
