import { editionAddressSchema } from '#shared/schemas/editions'
import { withdrawEditionSchema } from '#shared/schemas/fits'
import { defineRoute } from '../../../../../http/define-route'
import { requiredVersion } from '../../../../../http/if-match'
import { withdrawEdition } from '../../../../../services/editions/withdraw-edition'

export default defineRoute({
  access: 'coordinator',
  params: editionAddressSchema,
  body: withdrawEditionSchema,
  handler: ({ ctx, params, body, event }) => withdrawEdition(ctx, {
    targetId: params.targetId, number: params.n, reason: body.reason, seenVersion: requiredVersion(event),
  }),
})
