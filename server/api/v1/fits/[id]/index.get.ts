import { idParamsSchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../../http/define-route'
import { readFit } from '../../../../services/fits/read-fit'

export default defineRoute({
  access: 'signed-in',
  params: idParamsSchema,
  handler: ({ ctx, params }) => readFit(ctx, params.id),
})
