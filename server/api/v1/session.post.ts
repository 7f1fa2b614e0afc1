import { signInSchema } from '#shared/schemas/people'
import { clientAddressOf } from '../../http/client-address'
import { defineRoute } from '../../http/define-route'
import { keepSession } from '../../http/session'
import { signIn } from '../../services/people/sign-in'

export default defineRoute({
  access: 'public',
  body: signInSchema,
  async handler({ ctx, body, event }) {
    const { me, sessionId } = await signIn(ctx, body, clientAddressOf(event))
    await keepSession(event, sessionId)
    return { me }
  },
})
