import { createBreachHandlingService } from './features/breaches/breach-handling.service.ts'
import { createBreachesService } from './features/breaches/breaches.service.ts'
import { createSightingsService } from './features/breaches/sightings.service.ts'
import { createChecksReads } from './features/checks/checks.reads.ts'
import { createChecksService } from './features/checks/checks.service.ts'
import { createImportsService } from './features/imports/imports.service.ts'
import type { JobsService } from './features/jobs/jobs.service.ts'
import { createCoverageService } from './features/coverage/coverage.service.ts'
import { createDistinctSetsService } from './features/distinct-sets/distinct-sets.service.ts'
import { createPairsService } from './features/pairs/pairs.service.ts'
import { createRepairService } from './features/repair/repair.service.ts'
import { createHeadBeginService } from './features/revisions/head-begin.service.ts'
import { createHeadWriteService } from './features/revisions/head-write.service.ts'
import { createHeadsService } from './features/revisions/heads.service.ts'
import { createRevisionsReads } from './features/revisions/revisions.reads.ts'
import { createRevisionsService } from './features/revisions/revisions.service.ts'
import { createRulesService } from './features/rules/rules.service.ts'
import { createSystemsService, type SystemsDeps } from './features/systems/systems.service.ts'
import { createThemesService } from './features/themes/themes.service.ts'
import { createTokensService } from './features/tokens/tokens.service.ts'
import type { Repositories, Transact } from './repositories.ts'
import type { Platform } from './services.ts'

interface Reach {
  readonly reads: Repositories
  readonly transact: Transact<keyof Repositories>
  readonly findAccess: SystemsDeps['findAccess']
  readonly jobs: Pick<JobsService, 'start'>
}

/** Wires what a revision governs, around the one head and the one write. */
export function createGovernedServices(
  { newId, database, writeGuards, repairLanes }: Platform,
  { reads, transact, findAccess, jobs }: Reach,
) {
  const heads = createHeadsService({ heads: reads.heads, versions: reads.versions })
  const sightings = createSightingsService({ reads, newId })
  const breaches = createBreachesService({ reads: reads.breaches, newId })
  const writes = createHeadWriteService({
    heads,
    breaches,
    transact,
    outside: reads,
    guards: writeGuards,
  })
  const begins = createHeadBeginService()
  const coverage = createCoverageService({ heads, reads })
  const repair = createRepairService({ heads, jobs, lanes: repairLanes })
  return {
    heads,
    breaches,
    breachHandling: createBreachHandlingService({ transact, newId }),
    sightings,
    systems: createSystemsService({ reads, transact, begins, writes, newId, findAccess }),
    tokens: createTokensService({ heads, writes, newId }),
    pairs: createPairsService({ heads, writes, newId }),
    coverage,
    distinctSets: createDistinctSetsService({ heads, writes, newId }),
    themes: createThemesService({ heads, writes, newId }),
    rules: createRulesService({ heads, writes }),
    repair,
    imports: createImportsService({ heads, writes, jobs, newId }),
    checks: createChecksService({
      heads,
      reads: createChecksReads(database.db),
      repair,
      sightings,
      coverage,
      transact,
      newId,
    }),
    revisions: createRevisionsService({
      reads: createRevisionsReads(database.db),
      versions: reads.versions,
    }),
  }
}
