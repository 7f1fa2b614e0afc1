import type { Tx } from '../../repositories/connection'

/** A worker's hold on a job. It is lost where the worker falls silent for longer than the lease lasts. */
export interface Lease {
  jobId: string
  /** 1 for the first try. */
  attempt: number
  /** Aborts where the lease was taken over or the server is stopping: end the work and throw. */
  signal: AbortSignal
  /**
   * Throws LeaseLostError where another worker holds the job by now. Call it first in every transaction in which a handler
   * writes; with the lock of that transaction held, what follows is safe.
   */
  assertHeld(tx: Tx): Promise<void>
  /** Writes progress into the job row and renews the lease: a write each, so call it a few times a second at most. */
  reportProgress(fraction: number, stage: string): Promise<void>
}

export class LeaseLostError extends Error {
  constructor(jobId: string) {
    super(`The lease of job ${jobId} was taken over by another worker; nothing may be written by this one.`)
    this.name = 'LeaseLostError'
  }
}

/** Thrown by a handler where trying again cannot help: the job is dead at once. */
export class PermanentJobError extends Error {
  constructor(message: string, options?: ErrorOptions) {
    super(message, options)
    this.name = 'PermanentJobError'
  }
}
