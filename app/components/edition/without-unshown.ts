import type { EditionView } from '#shared/schemas/editions'

/** An edition without what its page never shows, or has in the snapshot: the request's measures, covariances, whitened rows. The snapshot's file has it all. */
export function withoutUnshown(edition: EditionView): EditionView {
  const { request, result } = edition.snapshot
  return {
    ...edition,
    thumbnailSvg: null,
    conic: null,
    elements: {},
    snapshot: {
      ...edition.snapshot,
      request: typeof request === 'object' && request !== null && 'settings' in request ? { settings: request.settings } : {},
      result: { ...result, covariance: null, residuals: result.residuals.map(residual => ({ ...residual, rows: [] })) },
    },
  }
}
