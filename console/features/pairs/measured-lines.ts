import type { Finding } from '#shared/checks/model.ts'

/** Findings of a pair that measure the same in one theme, as one line. */
export interface MeasuredLine {
  readonly key: string
  /** Theme id. */
  readonly theme: string
  readonly states: readonly string[]
  readonly finding: Finding
}

/** A pair's findings, themes in the order of the system, equal ones joined; furthest short first in each. */
export function measuredLines(
  findings: readonly Finding[],
  themes: readonly { readonly id: string }[],
): MeasuredLine[] {
  return themes.flatMap(({ id }) => {
    const lines = new Map<string, MeasuredLine>()
    for (const finding of findings) {
      if (finding.theme !== id) continue
      const { ratio, required, outcome, basis } = finding
      const key = [id, ratio, required, outcome, basis].join('/')
      const state = `${finding.foregroundState}/${finding.backgroundState}`
      const states = [...(lines.get(key)?.states ?? []), state]
      lines.set(key, { key, theme: id, states, finding: lines.get(key)?.finding ?? finding })
    }
    return [...lines.values()].sort((a, b) => margin(a.finding) - margin(b.finding))
  })
}

const margin = ({ ratio, required }: Finding): number =>
  required === 0 ? ratio * 100 : ratio / required
