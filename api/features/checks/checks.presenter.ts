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
    at: row.at.toISOString(),
  }
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
