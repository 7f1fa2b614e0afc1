import { idParamsSchema } from '#shared/schemas/ids'
import { changeRolesSchema } from '#shared/schemas/people'
import { defineRoute } from '../../../http/define-route'
import { changeRoles } from '../../../services/people/change-roles'

export default defineRoute({
  access: 'administrator',
  params: idParamsSchema,
  body: changeRolesSchema,
  handler: ({ ctx, params, body }) => changeRoles(ctx, params.id, body),
})
