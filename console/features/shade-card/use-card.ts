import { useEffect, useMemo, useState } from 'react'
import { type ColorProbe, createColorProbe } from '#shared/checks/color-probe.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { type CardCut, cutCard, type CutCard } from './card-cut.ts'

/** A place in which colours are tried: a token in the base theme at rest. */
export function useProbe(
  evaluation: Evaluation | undefined,
  token: string,
): ColorProbe | undefined {
  return useMemo(() => {
    const base = evaluation?.resolved.model.themes[0]?.id
    if (evaluation === undefined || base === undefined || !evaluation.resolved.tokens.has(token)) {
      return undefined
    }
    return createColorProbe(evaluation, { token, theme: base })
  }, [evaluation, token])
}

/** The card, a few rows a frame; the one before stays until the first rows of the next are cut. */
export function useCard(
  probe: ColorProbe | undefined,
  { center, columns, hueStepDegrees }: CardCut,
  cssOf: (color: Oklch) => string,
): CutCard | undefined {
  const [card, setCard] = useState<CutCard>()
  useEffect(() => {
    if (probe === undefined) return
    const cutting = cutCard(probe, { center, columns, hueStepDegrees }, cssOf)
    let frame = requestAnimationFrame(function cutOn() {
      const end = performance.now() + FRAME_MS
      let cut: CutCard | undefined
      do {
        const next = cutting.next()
        if (next.done === true) {
          if (cut !== undefined) setCard(cut)
          return
        }
        cut = next.value
      } while (performance.now() < end)
      setCard(cut)
      frame = requestAnimationFrame(cutOn)
    })
    return () => cancelAnimationFrame(frame)
  }, [probe, center, columns, hueStepDegrees, cssOf])
  return card
}

/** What cutting may take of a frame. */
const FRAME_MS = 8
