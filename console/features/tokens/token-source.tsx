import { formatComponent, formatHue } from '#console/lib/format.ts'
import type { TokenWire } from '#shared/contracts/tokens.contract.ts'

/** Heads of the three columns that a colour's own components take. */
export function SourceHeads() {
  return (
    <span className="flex justify-start">
      <abbr title="Lightness" className="w-40 text-end no-underline">
        L
      </abbr>
      <abbr title="Chroma" className="w-50 text-end no-underline">
        C
      </abbr>
      <abbr title="Hue" className="w-46 text-end no-underline">
        h
      </abbr>
    </span>
  )
}

/** What a token is set to: components, or the token it follows in braces. */
export function TokenSource({ token, base }: { token: TokenWire; base: string }) {
  const { value } = token
  if (typeof value === 'string') return <span className="text-ink-soft">{value}</span>
  if ('derive' in value) return <span className="text-ink-soft">from {value.derive}</span>
  const oklch = token.resolved[base]?.rest.oklch
  if (oklch === undefined) return null
  const [l = null, c = null, h = null] = oklch.components.map(numberOrMissing)
  return <Components l={l} c={c} h={h} alpha={oklch.alpha ?? 1} />
}

export function Components({
  l,
  c,
  h,
  alpha,
}: {
  l: number | null
  c: number | null
  h: number | null
  alpha: number | null
}) {
  return (
    <span className="figures flex whitespace-nowrap">
      <span className="w-40 text-end">{formatComponent(l)}</span>
      <span className="w-50 text-end">{formatComponent(c)}</span>
      <span className="w-46 text-end">{formatHue(h)}</span>
      {alpha !== 1 && (
        <span className="ml-6 text-ink-soft">/ {alpha === null ? 'none' : alpha.toFixed(2)}</span>
      )}
    </span>
  )
}

export function numberOrMissing(component: number | 'none'): number | null {
  return component === 'none' ? null : component
}
