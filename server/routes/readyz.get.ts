import { defineRoute } from '../http/define-route'
import { checkReadiness } from '../services/health/check-readiness'

export default defineRoute({ access: 'public', handler: ({ ctx }) => checkReadiness(ctx) })
