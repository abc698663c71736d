import { type ApiRouter, mount } from '#api/http/route.ts'
import { createImport, getResolverFile } from '#shared/contracts/imports.contract.ts'
import { getJob } from '#shared/contracts/jobs.contract.ts'
import { addressOf } from '#shared/contracts/route.ts'
import type { ImportsService } from './imports.service.ts'

export function mountImports(router: ApiRouter, imports: ImportsService): void {
  mount(router, createImport, async ({ system, params, query, body, requestId }) => {
    const answer = await imports.create(system, { query, body, requestId })
    if (answer.state === 'done') return { body: answer.outcome }
    const { job } = answer
    return { status: 202, body: job, location: addressOf(getJob, { ...params, id: job.id }) }
  })
  mount(router, getResolverFile, async ({ system }) => ({
    text: await imports.resolverFile(system),
    media: 'application/json',
  }))
}
