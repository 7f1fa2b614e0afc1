import { defineRoute } from '../http/define-route'
import { refuseUnknown } from '../http/refuse-unknown'

export default defineRoute({ access: 'public', handler: ({ event }) => refuseUnknown(event) })
