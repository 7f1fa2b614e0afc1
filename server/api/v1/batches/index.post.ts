import { UPLOAD_CAP_BYTES, UPLOAD_TYPES, uploadQuerySchema } from '#shared/schemas/batches'
import { defineRoute } from '../../../http/define-route'
import { readFileBody } from '../../../http/read-file-body'
import { uploadBatch } from '../../../services/batches/upload-batch'

export default defineRoute({
  access: 'observer',
  query: uploadQuerySchema,
  status: 201,
  async handler({ ctx, query, event }) {
    const body = await readFileBody(event, { types: UPLOAD_TYPES, capBytes: UPLOAD_CAP_BYTES })
    return uploadBatch(ctx, { fileName: query.fileName, kind: query.kind, targetId: query.targetId ?? null, ...body })
  },
})
