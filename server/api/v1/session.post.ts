import { getRequestIP } from 'h3'
import { signInSchema } from '#shared/schemas/people'
import { defineRoute } from '../../http/define-route'
import { keepSession } from '../../http/session'
import { signIn } from '../../services/people/sign-in'

export default defineRoute({
  access: 'public',
  body: signInSchema,
  async handler({ ctx, body, event }) {
    const { me, sessionId } = await signIn(ctx, body, getRequestIP(event) ?? 'unknown')
    await keepSession(event, sessionId)
    return { me }
  },
})
