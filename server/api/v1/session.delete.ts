import { defineRoute } from '../../http/define-route'
import { forgetSession, sessionIdOf } from '../../http/session'
import { signOut } from '../../services/people/sign-out'

export default defineRoute({
  access: 'signed-in',
  async handler({ ctx, event }) {
    await signOut(ctx, sessionIdOf(event))
    await forgetSession(event)
  },
})
