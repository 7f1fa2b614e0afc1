import type { Kind } from '../../fitting/types'

/** The kinds whose measures can be sent, fitted and published; for a kind that is missing here every door says so. */
export const AVAILABLE_KINDS: readonly Kind[] = ['relative', 'equatorial', 'plane']

export function isAvailableKind(kind: Kind): boolean {
  return AVAILABLE_KINDS.includes(kind)
}

export const KIND_COMING = {
  reason: 'Measures in right ascension and declination cannot be taken yet: that is coming with the engine for comets and minor planets.',
  remedy: 'Keep the file; pairs (θ, ρ or east, north) and positions in the plane of an orbit (φ, r) can be sent now.',
} as const
