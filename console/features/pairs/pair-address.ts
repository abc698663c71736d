import { RELATIONS, USES } from '#shared/checks/model.ts'
import type { PairInput } from '#shared/contracts/pairs.contract.ts'
import type { PairDraft } from './pair-draft.ts'

const UNKNOWN = '?'

/** What an address says of a pair that is to be declared; the rest is for its fields. */
export function readPairAddress(search: URLSearchParams): PairDraft {
  const use = USES.find((each) => each === search.get('use'))
  const relation = RELATIONS.find((each) => each === search.get('relation'))
  const backdrop = search.getAll('backdrop')
  return {
    foreground: search.get('foreground') ?? '',
    background: search.get('background') ?? '',
    ...(use === undefined ? {} : { use }),
    ...(relation === undefined ? {} : { relation }),
    ...(backdrop.length === 0 ? {} : { backdrop: backdrop[0] === UNKNOWN ? 'unknown' : backdrop }),
  }
}

/** The query of an address that `readPairAddress` reads. */
export function writePairAddress({
  foreground,
  background,
  use,
  relation,
  backdrop = [],
}: Partial<PairInput>): string {
  const layers = backdrop === 'unknown' ? [UNKNOWN] : backdrop
  const said = new URLSearchParams()
  if (foreground !== undefined) said.set('foreground', foreground)
  if (background !== undefined) said.set('background', background)
  if (use !== undefined) said.set('use', use)
  if (relation !== undefined) said.set('relation', relation)
  for (const layer of layers) said.append('backdrop', layer)
  return `?${said}`
}
