import type { Kind } from '../../fitting/types'

/** What pages call the kinds of target. */
export const KIND_TEXT: Record<Kind, string> = {
  relative: 'double star',
  equatorial: 'comet or minor planet',
  plane: 'in the plane of the orbit',
}

/** The same for lists and filters. */
export const KINDS_TEXT: Record<Kind, string> = {
  relative: 'double stars',
  equatorial: 'comets and minor planets',
  plane: 'in the plane',
}
