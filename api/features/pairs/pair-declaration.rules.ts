import type { PairModel } from '#shared/checks/model.ts'
import { canonicalJson } from '#shared/formats/canonical-json.ts'

/** What may be declared once only: two pairs that agree in it are the same pair. */
export function declarationOf(pair: PairModel): string {
  const { foreground, background, backdrop, use, relation, anyOf, product } = pair
  return canonicalJson([
    foreground,
    background,
    backdrop,
    use,
    relation,
    anyOf ?? null,
    product ?? null,
  ])
}
