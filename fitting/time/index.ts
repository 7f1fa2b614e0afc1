/** Times: Julian and Besselian epochs, calendars, ISO 8601, UTC to TT, position angles at another equinox. */
export * from './calendar'
export { DELTA_T_YEARS, deltaTSeconds } from './delta-t'
export * from './epochs'
export * from './equinox'
export * from './iso-time'
export * from './time-scales'
