import * as breaches from './breaches.contract.ts'
import * as checks from './checks.contract.ts'
import * as colors from './colors.contract.ts'
import * as coverage from './coverage.contract.ts'
import * as distinctSets from './distinct-sets.contract.ts'
import * as health from './health.contract.ts'
import * as imports from './imports.contract.ts'
import * as jobs from './jobs.contract.ts'
import * as keys from './keys.contract.ts'
import * as members from './members.contract.ts'
import * as pairs from './pairs.contract.ts'
import * as repair from './repair.contract.ts'
import * as revisions from './revisions.contract.ts'
import type { Contract } from './route.ts'
import * as rules from './rules.contract.ts'
import * as sessions from './sessions.contract.ts'
import * as sightings from './sightings.contract.ts'
import * as systems from './systems.contract.ts'
import * as themes from './themes.contract.ts'
import * as tokens from './tokens.contract.ts'

const isContract = (value: unknown): value is Contract =>
  typeof value === 'object' && value !== null && 'operationId' in value

/** Every operation of the service, in the order of the document. */
export const contracts: readonly Contract[] = [
  sessions,
  systems,
  tokens,
  pairs,
  themes,
  rules,
  distinctSets,
  coverage,
  imports,
  checks,
  breaches,
  sightings,
  revisions,
  repair,
  colors,
  keys,
  members,
  jobs,
  health,
].flatMap((feature) => Object.values(feature).filter(isContract))
