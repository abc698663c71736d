import { type ApiRouter, mount } from '#api/http/route.ts'
import { getHealth, getReadiness } from '#shared/contracts/health.contract.ts'
import type { HealthService } from './health.service.ts'

export function mountHealth(router: ApiRouter, health: HealthService): void {
  mount(router, getHealth, () => ({ body: { status: 'up' as const } }))
  mount(router, getReadiness, async () => {
    await health.assertReady()
    return { body: { status: 'ready' as const } }
  })
}
