import type { AnyJobDefinition } from '../runner/job-definition'
import { runFitJob } from './run-fit.job'
import { sendMailJob } from './send-mail.job'

/** Every job that this server runs. */
export const jobDefinitions: readonly AnyJobDefinition[] = [runFitJob, sendMailJob]
