import { mountBreaches } from './features/breaches/breaches.routes.ts'
import { mountChecks } from './features/checks/checks.routes.ts'
import { mountColors } from './features/colors/colors.routes.ts'
import { mountCoverage } from './features/coverage/coverage.routes.ts'
import { mountDistinctSets } from './features/distinct-sets/distinct-sets.routes.ts'
import { mountHealth } from './features/health/health.routes.ts'
import { mountImports } from './features/imports/imports.routes.ts'
import { mountJobs } from './features/jobs/jobs.routes.ts'
import { mountKeys } from './features/keys/keys.routes.ts'
import { mountMembers } from './features/members/members.routes.ts'
import { mountPairs } from './features/pairs/pairs.routes.ts'
import { mountRepair } from './features/repair/repair.routes.ts'
import { mountRevisions } from './features/revisions/revisions.routes.ts'
import { mountRules } from './features/rules/rules.routes.ts'
import { mountSessions } from './features/sessions/sessions.routes.ts'
import { mountSystems } from './features/systems/systems.routes.ts'
import { mountThemes } from './features/themes/themes.routes.ts'
import { mountTokens } from './features/tokens/tokens.routes.ts'
import type { ApiRouter } from './http/route.ts'
import type { Services } from './services.ts'

/** Every operation of the service: one line a feature. */
export function mountAll(router: ApiRouter, services: Services): void {
  mountSessions(router, services.sessions)
  mountKeys(router, services.keys)
  mountMembers(router, services.members)
  mountSystems(router, services.systems)
  mountTokens(router, services.tokens)
  mountPairs(router, services.pairs)
  mountThemes(router, services.themes)
  mountRules(router, services.rules)
  mountDistinctSets(router, services.distinctSets)
  mountCoverage(router, services.coverage)
  mountImports(router, services.imports)
  mountChecks(router, services.checks)
  mountBreaches(router, services)
  mountRevisions(router, services.revisions)
  mountRepair(router, services.repair)
  mountColors(router)
  mountJobs(router, services.jobs)
  mountHealth(router, services.health)
}
