import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { GovernedSystem } from '#shared/checks/governed-model.ts'
import { verdictOf } from '#shared/checks/verdict.ts'
import type { Weakening } from '#shared/checks/weakening-kinds.ts'
import { type ImportWire, MOST_LISTED } from '#shared/contracts/import-outcome.ts'
import { namesIn, presentAdvisory, presentFinding } from '#shared/contracts/present-finding.ts'
import { importChanges, type ItemChange } from './import-changes.rules.ts'
import { type ShownColors, shownColors } from './import-colors.rules.ts'
import type { ImportFile } from './import-file.ts'

/** A head before and after an import. */
interface Side {
  readonly model: GovernedSystem
  readonly evaluation: Evaluation
}

export interface Imported {
  readonly dryRun: boolean
  readonly mode: ImportWire['mode']
  readonly file: ImportFile
  readonly before: Side
  readonly after: Side
  readonly weakens: readonly Weakening[]
  readonly effect: ImportWire['effect']
  readonly written: boolean
}

/** What an import changed, or would change, with its check; long lists are cut, and how much of them is told. */
export function presentImport(imported: Imported): ImportWire {
  const { dryRun, mode, written, file, before, after, effect } = imported
  const names = namesIn(after.evaluation.resolved)
  const { changes, counts } = importChanges(before.model, after.model)
  const verdict = verdictOf(after.evaluation, { include: 'not-pass' })
  const shown = [before, after].map(({ evaluation }) => shownColors(evaluation.resolved))
  const [shownBefore, shownAfter] = shown as [ShownColors, ShownColors]
  const more: Record<string, number> = {}
  const cut = <Item>(list: string, items: readonly Item[]): Item[] => {
    if (items.length > MOST_LISTED) more[list] = items.length - MOST_LISTED
    return items.slice(0, MOST_LISTED)
  }
  const answer = {
    dryRun,
    mode,
    written,
    counts: { ...counts, derivedAgain: file.derivedAgain },
    grounds: { before: shownBefore.grounds, after: shownAfter.grounds },
    changes: cut('changes', changes).map((change) => withColors(change, shownBefore, shownAfter)),
    notes: cut('notes', file.notes),
    weakens: cut('weakens', imported.weakens).map(({ code, detail }) => ({ code, detail })),
    effect,
    check: {
      verdict: verdict.verdict,
      counts: verdict.counts,
      findings: cut('findings', verdict.findings).map((one) => presentFinding(one, names)),
      advisories: cut('advisories', verdict.advisories).map((one) => presentAdvisory(one, names)),
      engine: verdict.engine,
    },
  }
  return Object.keys(more).length === 0 ? answer : { ...answer, more }
}

function withColors(
  { id, wire }: ItemChange,
  before: ShownColors,
  after: ShownColors,
): ImportWire['changes'][number] {
  if (wire.item !== 'token' || id === undefined) return wire
  const colors = {
    ...(wire.before === undefined ? {} : { before: before.of(id) }),
    ...(wire.after === undefined ? {} : { after: after.of(id) }),
  }
  return { ...wire, colors }
}
