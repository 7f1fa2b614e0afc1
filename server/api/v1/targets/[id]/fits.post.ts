import { setResponseStatus } from 'h3'
import { requestFitSchema } from '#shared/schemas/fits'
import { idParamsSchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../../http/define-route'
import { requestFit } from '../../../../services/fits/request-fit'

export default defineRoute({
  access: 'coordinator',
  params: idParamsSchema,
  body: requestFitSchema,
  async handler({ ctx, params, body, event }) {
    const { fit, isNew } = await requestFit(ctx, params.id, body)
    setResponseStatus(event, isNew ? 201 : 200)
    return fit
  },
})
