import { formatCss, interpolate, parse, toGamut, wcagContrast } from 'culori'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import { STATES } from '#shared/checks/model.ts'
import { STATE_COUNT } from '#shared/checks/resolved.ts'

const intoSrgb = toGamut('rgb', 'oklch')

/** One finding as a user of a colour library has it: three CSS colours. */
export interface NaiveFinding {
  readonly foreground: string
  readonly background: string
  readonly ground: string
}

/** Every finding of an evaluation, with the colours as their sources say them in CSS. */
export function naiveFindings({ resolved, measures }: Evaluation): NaiveFinding[] {
  const { themes } = resolved.model
  const css = (token: string, theme: number, state: number): string => {
    const cell = resolved.tokens.get(token)!.cells[theme * STATE_COUNT + state]!
    const { l, c, h, alpha } = cell.color.oklch
    return formatCss({ mode: 'oklch', l: l ?? 0, c: c ?? 0, h: h ?? 0, alpha: alpha ?? 0 })
  }
  return measures.flatMap(({ pair, themes: positions, combinations }) =>
    positions.flatMap((theme) =>
      combinations.map((combination) => ({
        foreground: css(pair.foreground, theme, Math.floor(combination / STATES.length)),
        background: css(pair.background, theme, combination % STATES.length),
        ground: css(themes[theme]!.ground, theme, 0),
      })),
    ),
  )
}

/** Parses, maps, composites and measures one finding after another. @returns how many fall short of 4.5 */
export function naiveLoop(findings: readonly NaiveFinding[]): number {
  let short = 0
  for (const finding of findings) {
    const background = over(mapped(finding.background), mapped(finding.ground))
    const foreground = over(mapped(finding.foreground), background)
    if (wcagContrast(foreground, background) < 4.5) short += 1
  }
  return short
}

function mapped(text: string) {
  return intoSrgb(parse(text)!)
}

type Rgb = ReturnType<typeof mapped>

function over(top: Rgb, under: Rgb): Rgb {
  const alpha = top.alpha ?? 1
  if (alpha === 1) return top
  return interpolate([under, { ...top, alpha: 1 }], 'rgb')(alpha)
}
