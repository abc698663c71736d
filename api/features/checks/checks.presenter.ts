import type { CheckSummaryWire } from '#shared/contracts/checks.contract.ts'
import type { CheckSummaryRow } from './checks.reads.ts'

/** A check without its findings. */
export function presentCheckSummary(row: CheckSummaryRow): CheckSummaryWire {
  const source = presentSource(row)
  return {
    id: row.id,
    number: row.number,
    verdict: row.verdict,
    counts: row.counts,
    engine: { version: row.engineVersion, gamutMap: row.gamutMap, ruleSet: row.ruleSet },
    against: { revision: row.againstRevision },
    ...(source === undefined ? {} : { source }),
    ...(row.logged === null ? {} : { logged: row.logged }),
    caller: presentCaller(row),
    at: row.at.toISOString(),
  }
}

function presentCaller({ user, key }: CheckSummaryRow): CheckSummaryWire['caller'] {
  if (key !== null) return { kind: 'key', ...key }
  if (user !== null) return { kind: 'user', ...user }
  throw new TypeError('Every check was asked for by somebody')
}

type SourceColumns = Pick<CheckSummaryRow, 'repository' | 'branch' | 'commitSha' | 'pipelineUrl'>

function presentSource(row: SourceColumns): CheckSummaryWire['source'] {
  const { repository, branch, commitSha, pipelineUrl } = row
  const source = {
    ...(repository === null ? {} : { repository }),
    ...(branch === null ? {} : { branch }),
    ...(commitSha === null ? {} : { commit: commitSha }),
    ...(pipelineUrl === null ? {} : { pipelineUrl }),
  }
  return Object.keys(source).length === 0 ? undefined : source
}
