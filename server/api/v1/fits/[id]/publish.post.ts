import { publishSchema } from '#shared/schemas/fits'
import { idParamsSchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../../http/define-route'
import { requiredVersion } from '../../../../http/if-match'
import { publishEdition } from '../../../../services/editions/publish-edition'

export default defineRoute({
  access: 'coordinator',
  params: idParamsSchema,
  body: publishSchema,
  status: 201,
  handler: ({ ctx, params, body, event }) => publishEdition(ctx, { fitId: params.id, whatChanged: body.whatChanged, seenVersion: requiredVersion(event) }),
})
