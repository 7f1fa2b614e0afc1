/** What a query runs on: `Tx` where it writes, `Reads` where either a transaction or the read-only connection will do. */
export type { Reads, Tx } from '../db/client'
