import { formatHex } from '#shared/color/format-color.ts'
import type { RenderedColor } from '#shared/color/render.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { GovernedToken } from '#shared/checks/governed-model.ts'
import { describeProvenance } from '#shared/checks/provenance.ts'
import { colorOf, type ResolvedValue, statesOf } from '#shared/checks/resolved.ts'
import type { SystemIndex } from '#shared/contracts/governed-system.ts'
import { presentToken } from '#shared/contracts/present-items.ts'
import type { ResolvedColorWire, TokenWire } from '#shared/contracts/tokens.contract.ts'
import type { ModelNames } from '#shared/contracts/wire-values.ts'
import { writeDtcgColor } from '#shared/formats/dtcg-color.ts'

/** A system as its tokens are read out of it. */
export interface MeasuredSystem {
  readonly index: SystemIndex
  readonly evaluation: Evaluation
}

/** A token with what it comes to in every theme and state that it takes part in. */
export function presentResolvedToken(
  token: GovernedToken,
  { index, evaluation }: MeasuredSystem,
): Omit<TokenWire, 'etag'> {
  const states = statesOf(evaluation.resolved, token.id)
  const themes = index.model.themes.map(({ id, key }) => {
    const byState = states.map((state) => {
      const value = colorOf(evaluation.resolved, { token: token.id, theme: id, state })
      return [state, presentColor(value, index.names)]
    })
    return [key, Object.fromEntries(byState)]
  })
  return { ...presentToken(token, index.names), resolved: Object.fromEntries(themes) }
}

export const hexOf = ({ r, g, b, a }: RenderedColor): string => formatHex(r, g, b, a)

const BYTE = 255

function presentColor(value: ResolvedValue, names: ModelNames): ResolvedColorWire {
  const { oklch, rendered, provenance } = value
  const { p3r, p3g, p3b, a, gamut } = rendered
  return {
    oklch: writeDtcgColor(oklch),
    hex: hexOf(rendered),
    p3: {
      colorSpace: 'display-p3',
      components: [p3r / BYTE, p3g / BYTE, p3b / BYTE],
      alpha: a / BYTE,
    },
    gamut,
    provenance: { from: provenance.from, text: describeProvenance(provenance, names.tokenName) },
  }
}
