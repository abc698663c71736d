import { promisify } from 'node:util'
import { gunzip, gzip } from 'node:zlib'
import type { CheckWire } from '#shared/contracts/checks.contract.ts'

/** What is kept of a check besides its counts: as it was answered, in the names of its day. */
export type KeptFindings = Pick<CheckWire, 'findings' | 'advisories' | 'distinctSets'>

const compress = promisify(gzip)
const expand = promisify(gunzip)

/** Packs findings for their row. */
export const packFindings = (kept: KeptFindings): Promise<Buffer> => compress(JSON.stringify(kept))

/** Unpacks what `packFindings` packed. */
export async function unpackFindings(packed: Buffer): Promise<KeptFindings> {
  const text = (await expand(packed)).toString('utf8')
  // A check that was kept before distinct sets were measured has none.
  return { distinctSets: [], ...(JSON.parse(text) as Omit<KeptFindings, 'distinctSets'>) }
}
