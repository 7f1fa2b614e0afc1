import { pino } from 'pino'
import type { LogLevel } from '../config/env'

/** One JSON line an event; fields never hold names, addresses, passwords or tokens. */
export interface Log {
  debug(fields: object, message: string): void
  info(fields: object, message: string): void
  warn(fields: object, message: string): void
  error(fields: object, message: string): void
}

export function createLogger(level: LogLevel): Log {
  return pino({ level, base: undefined, timestamp: pino.stdTimeFunctions.isoTime })
}

export const silentLog: Log = { debug() {}, info() {}, warn() {}, error() {} }
