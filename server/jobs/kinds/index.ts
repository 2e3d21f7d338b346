import type { JobKind } from '../../../shared/schemas/jobs'
import type { JobKindHandler } from '../kind'
import { capacityJob } from './capacity'
import { embeddingJob } from './embedding'
import { importJob } from './import'
import { referenceJob } from './reference'
import { rehearsalJob } from './rehearsal'
import { scanJob } from './scan'

/** Every kind of background work. */
export const JOB_KINDS: Record<JobKind, JobKindHandler> = {
  capacity: capacityJob,
  embedding: embeddingJob,
  import: importJob,
  reference: referenceJob,
  rehearsal: rehearsalJob,
  scan: scanJob,
}
