import { editionAddressSchema } from '#shared/schemas/editions'
import { defineRoute } from '../../../../../http/define-route'
import { readEdition } from '../../../../../services/editions/read-edition'

export default defineRoute({
  access: 'public',
  params: editionAddressSchema,
  handler: ({ ctx, params }) => readEdition(ctx, params.targetId, params.n),
})
