import type { Workshop } from './run-one-job'
import { runOneJob } from './run-one-job'

/** Runs jobs one after the other until none may run at the clock's now; answers how many ran. For tests, the demo and commands. */
export async function runJobsUntilIdle(ctx: Workshop['ctx'], { definitions, tools }: Pick<Workshop, 'definitions' | 'tools'>): Promise<number> {
  const workshop: Workshop = { ctx, definitions, tools, stopSignal: new AbortController().signal }
  let count = 0
  while (await runOneJob(workshop)) count += 1
  return count
}
