import { editionAddressSchema } from '#shared/schemas/editions'
import { defineRoute } from '../../../../../http/define-route'
import { sendDownload } from '../../../../../http/send-download'
import { downloadEdition } from '../../../../../services/editions/download-edition'

export default defineRoute({
  access: 'public',
  params: editionAddressSchema,
  handler: async ({ ctx, params, event }) => sendDownload(event, await downloadEdition(ctx, { targetId: params.targetId, number: params.n, name: 'snapshot.json' })),
})
