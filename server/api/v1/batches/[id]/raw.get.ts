import { idParamsSchema } from '#shared/schemas/ids'
import { defineRoute } from '../../../../http/define-route'
import { sendAttachment } from '../../../../http/send-attachment'
import { readRawFile } from '../../../../services/batches/read-batch'

export default defineRoute({
  access: 'signed-in',
  params: idParamsSchema,
  handler: async ({ ctx, params, event }) => sendAttachment(event, await readRawFile(ctx, params.id)),
})
