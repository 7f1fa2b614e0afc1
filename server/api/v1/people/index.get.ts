import { pageQuerySchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../http/define-route'
import { listPeople } from '../../../services/people/list-people'

export default defineRoute({
  access: 'administrator',
  query: pageQuerySchema,
  handler: ({ ctx, query }) => listPeople(ctx, query),
})
