/** Circle constant π, rounded to double precision. */
export const PI = 3.141592653589793

/** Full turn 2π, rad. */
export const TWO_PI = 6.283185307179586

/** Quarter turn π/2, rad. */
export const HALF_PI = 1.5707963267948966

/** One degree in radians: multiply degrees by it. */
export const DEG = 0.017453292519943295

/** One radian in degrees: multiply radians by it. */
export const RAD = 57.29577951308232
