import type { ImportNoteWire } from '#shared/contracts/import-outcome.ts'
import { type JsonObject, objectOf } from '#shared/formats/dtcg-fault.ts'
import type { DtcgResolver } from '#shared/formats/dtcg-resolver.ts'
import { CORE, type ResolverBesides, STATE, THEME } from '#shared/formats/system-resolver.ts'
import { foreignExtensions } from './import-remainder.rules.ts'

type Step = DtcgResolver['steps'][number]

/** Members of a resolver file that are read into the system, and come back from there. */
const READ_MEMBERS = ['version', 'sets', 'modifiers', 'resolutionOrder', '$extensions']

/** What a file of ours says besides: its parts bear our names. */
export function ownBesides(file: JsonObject, { steps }: DtcgResolver): ResolverBesides {
  const said = (kind: Step['kind'], name: string) =>
    steps.find((step) => step.kind === kind && step.name === name)?.besides
  return besidesIn(file, {
    core: said('set', CORE),
    theme: said('modifier', THEME),
    state: said('modifier', STATE),
  })
}

/** What a file of another making says besides, of the parts that become ours. Several sets become one. */
export function foreignBesides(
  file: JsonObject,
  { steps }: DtcgResolver,
  modifier: string | undefined,
): { readonly besides: ResolverBesides; readonly notes: readonly ImportNoteWire[] } {
  const sets = steps.filter(({ kind }) => kind === 'set')
  const [core] = sets.length === 1 ? sets : []
  const theme = steps.find(({ kind, name }) => kind === 'modifier' && name === modifier)
  const notes = steps.flatMap((step, at): ImportNoteWire[] => {
    if (step.kind === 'modifier' || step === core || isEmpty(step.besides)) return []
    const pointer = `/resolutionOrder/${at}`
    const detail = `Sets become one, so what is said of the set ${step.name} itself is not kept`
    return [{ kind: 'left-out', pointer, detail }]
  })
  return { besides: besidesIn(file, { core: core?.besides, theme: theme?.besides }), notes }
}

function besidesIn(
  file: JsonObject,
  parts: { readonly [part in 'core' | 'theme' | 'state']?: JsonObject | undefined },
): ResolverBesides {
  const members = Object.entries(file).filter(([member]) => !READ_MEMBERS.includes(member))
  const $extensions = foreignExtensions(objectOf(file.$extensions) ?? {})
  const root = { ...Object.fromEntries(members), ...($extensions ? { $extensions } : {}) }
  const all = Object.entries({ root, ...parts })
  return Object.fromEntries(all.filter(([, part]) => part !== undefined && !isEmpty(part)))
}

const isEmpty = (part: JsonObject): boolean => Object.keys(part).length === 0
