import { constants, setPriority } from 'node:os'
import type { MessagePort } from 'node:worker_threads'
import { fitOrbit } from '../../../fitting'
import type { FitOutcome, FitRequest } from '../../../fitting'

/** Least time between two steps that are posted, milliseconds; the engine takes far more of them. */
const POST_INTERVAL_MS = 50

// A fit can wait, a reader should not: on Linux this lowers the calling thread alone (setpriority(2), "C library/kernel
// differences"); elsewhere it would lower the whole process.
if (process.platform === 'linux') setPriority(0, constants.priority.PRIORITY_BELOW_NORMAL)

export interface FitTask {
  request: FitRequest
  /** Where progress is posted; the first step at once. */
  port: MessagePort
}

/** Runs the engine in a thread of its own; the only caller of fitOrbit on the server. */
export default function fit({ request, port }: FitTask): FitOutcome {
  let lastMs: number | null = null
  try {
    return fitOrbit(request, (step) => {
      const nowMs = performance.now()
      if (lastMs !== null && nowMs - lastMs < POST_INTERVAL_MS) return
      lastMs = nowMs
      port.postMessage(step)
    })
  }
  finally {
    port.close()
  }
}
