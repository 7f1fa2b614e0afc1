import { createProgrammeSchema } from '#shared/schemas/targets'
import { defineRoute } from '../../../http/define-route'
import { createProgramme } from '../../../services/programmes/create-programme'

export default defineRoute({
  access: 'administrator',
  body: createProgrammeSchema,
  status: 201,
  handler: ({ ctx, body }) => createProgramme(ctx, body),
})
