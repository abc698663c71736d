import type * as z from 'zod'
import type { DistinctSet } from '#shared/checks/model.ts'
import type {
  createDistinctSetBody,
  patchDistinctSetBody,
} from '#shared/contracts/distinct-sets.contract.ts'
import {
  type Decision,
  refuse,
  refuseFaults,
  type SystemIndex,
} from '#shared/contracts/governed-system.ts'
import { type Reading, readTokenName } from '#shared/contracts/wire-values.ts'

export type CreateDistinctSetBody = z.output<typeof createDistinctSetBody>
export type PatchDistinctSetBody = z.output<typeof patchDistinctSetBody>

const MOST_SETS = 100

/** A set to be added after the others. */
export function decideCreate(
  index: SystemIndex,
  { name, tokens }: CreateDistinctSetBody,
  id: string,
): Decision {
  if ((index.model.distinctSets ?? []).length >= MOST_SETS) {
    const detail = `A system has at most ${MOST_SETS} distinct sets`
    return refuseFaults([{ pointer: '', detail }])
  }
  return decidePut(index, { id, name }, tokens)
}

/** An edit of a set; what the body does not name stays. */
export function decidePatch(
  index: SystemIndex,
  before: DistinctSet,
  { name = before.name, tokens }: PatchDistinctSetBody,
): Decision {
  if (tokens !== undefined) return decidePut(index, { id: before.id, name }, tokens)
  const clash = nameRefusal(index, { id: before.id, name })
  return clash ?? putting({ ...before, name })
}

/** The removal of a set; it gates nothing. */
export const decideDelete = ({ id }: DistinctSet): Decision => ({
  ok: true,
  edits: { distinctSets: { remove: [id] } },
})

type Named = Pick<DistinctSet, 'id' | 'name'>

function decidePut(index: SystemIndex, named: Named, names: readonly string[]): Decision {
  const clash = nameRefusal(index, named)
  if (clash) return clash
  const reading: Reading = { names: index.names, faults: [] }
  const tokens = names.map((name, at) => {
    if (names.indexOf(name) !== at) {
      reading.faults.push({ pointer: `/tokens/${at}`, detail: `${name} is in it already` })
    }
    return readTokenName(name, `/tokens/${at}`, reading)
  })
  return reading.faults.length > 0 ? refuseFaults(reading.faults) : putting({ ...named, tokens })
}

function nameRefusal({ model }: SystemIndex, { id, name }: Named) {
  const other = model.distinctSets?.find((set) => set.name === name && set.id !== id)
  return other && refuse('distinct-set-name-taken', `There is a distinct set ${name} (${other.id})`)
}

const putting = (set: DistinctSet): Decision => ({
  ok: true,
  edits: { distinctSets: { put: [set] } },
})
