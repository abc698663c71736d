import { type ApiRouter, mount } from '#api/http/route.ts'
import { getJob } from '#shared/contracts/jobs.contract.ts'
import type { JobsService } from './jobs.service.ts'

export function mountJobs(router: ApiRouter, jobs: JobsService): void {
  mount(router, getJob, async ({ system, params }) => ({ body: await jobs.get(system, params.id) }))
}
