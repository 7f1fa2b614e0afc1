import { requestFitSchema } from '#shared/schemas/fits'
import { idParamsSchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../../http/define-route'
import { requestFit } from '../../../../services/fits/request-fit'

export default defineRoute({
  access: 'coordinator',
  params: idParamsSchema,
  body: requestFitSchema,
  status: 201,
  async handler({ ctx, params, body, setStatus }) {
    const { fit, isNew } = await requestFit(ctx, params.id, body)
    if (!isNew) setStatus(200)
    return fit
  },
})
