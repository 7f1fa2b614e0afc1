import { ruleSchema } from '#shared/schemas/fits'
import { idParamsSchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../../http/define-route'
import { requiredVersion } from '../../../../http/if-match'
import { ruleOnFit } from '../../../../services/desk/rule-on-fit'

export default defineRoute({
  access: 'coordinator',
  params: idParamsSchema,
  body: ruleSchema,
  handler: ({ ctx, params, body, event }) => ruleOnFit(ctx, { fitId: params.id, ...body, seenVersion: requiredVersion(event) }),
})
