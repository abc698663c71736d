import { type ApiRouter, mount } from '#api/http/route.ts'
import { getJob } from '#shared/contracts/jobs.contract.ts'
import { listUsableOn, nearestPassing, planRepair } from '#shared/contracts/repair.contract.ts'
import { addressOf } from '#shared/contracts/route.ts'
import type { RepairAnswer, RepairService } from './repair.service.ts'

export function mountRepair(router: ApiRouter, repair: RepairService): void {
  mount(router, nearestPassing, async ({ system, params, body, requestId }) =>
    answerOf(params.system, await repair.nearest(system, params.name, { ...body, requestId })),
  )
  mount(router, planRepair, async ({ system, params, body, requestId }) =>
    answerOf(params.system, await repair.plan(system, { ...body, requestId })),
  )
  mount(router, listUsableOn, async ({ system, params, query }) => ({
    body: await repair.usableOn(system, { params, query }),
  }))
}

function answerOf<Outcome>(system: string, answer: RepairAnswer<Outcome>) {
  if (answer.state === 'done') return { body: answer.outcome }
  const { job } = answer
  return { status: 202 as const, body: job, location: addressOf(getJob, { system, id: job.id }) }
}
