import { defineRoute } from '../http/define-route'

/** Whether the process is alive, for a supervisor that restarts it. */
export default defineRoute({ access: 'public', handler: () => ({ status: 'alive' }) })
