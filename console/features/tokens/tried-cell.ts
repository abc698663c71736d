import type { CellHalf } from '#console/ui/strip-cell.tsx'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import { DERIVED_STATES, type Finding, type State } from '#shared/checks/model.ts'
import { colorOf, statesOf } from '#shared/checks/resolved.ts'
import { formatHex } from '#shared/color/format-color.ts'

/** One half of a token's cell as an evaluation has it; `theme` and `ground` are ids. */
export function evaluatedHalf(
  { resolved }: Evaluation,
  where: { readonly token: string; readonly ground: string; readonly theme: string },
  findings: readonly Finding[],
): CellHalf {
  const { token, theme } = where
  const hexOf = (id: string, state: State) => {
    const { r, g, b, a } = colorOf(resolved, { token: id, theme, state }).rendered
    return formatHex(r, g, b, a)
  }
  const listed = statesOf(resolved, token)
  const states = DERIVED_STATES.filter((state) => listed.includes(state))
  return {
    ground: hexOf(where.ground, 'rest'),
    rest: hexOf(token, 'rest'),
    breaches: findings.some((finding) => finding.theme === theme && finding.outcome === 'breach'),
    ...(states.length > 0
      ? { states: Object.fromEntries(states.map((state) => [state, hexOf(token, state)])) }
      : {}),
  }
}
