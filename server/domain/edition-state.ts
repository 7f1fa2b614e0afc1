import type { EditionState } from '../../shared/schemas/editions'

/** The life of an edition: published → superseded | withdrawn. Its address and its bytes stay whatever becomes of it. */
const NEXT: Readonly<Record<EditionState, readonly EditionState[]>> = {
  published: ['superseded', 'withdrawn'],
  superseded: [],
  withdrawn: [],
}

export function canBecome(from: EditionState, to: EditionState): boolean {
  return NEXT[from].includes(to)
}
