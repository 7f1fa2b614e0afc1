import { sendMailJob } from './definitions/send-mail.job'
import type { AnyJobDefinition } from './runner/job-definition'

/** Every job that this server runs. */
export const jobDefinitions: readonly AnyJobDefinition[] = [sendMailJob]
