import { mountHealth } from './features/health/health.routes.ts'
import { mountKeys } from './features/keys/keys.routes.ts'
import { mountMembers } from './features/members/members.routes.ts'
import { mountSessions } from './features/sessions/sessions.routes.ts'
import type { ApiRouter } from './http/route.ts'
import type { Services } from './services.ts'

/** Every operation of the service: one line a feature. */
export function mountAll(router: ApiRouter, services: Services): void {
  mountSessions(router, services.sessions)
  mountKeys(router, services.keys)
  mountMembers(router, services.members)
  mountHealth(router, services.health)
}
