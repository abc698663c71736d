import { stateInWords } from '#shared/checks/finding-words.ts'
import type { ReactNode } from 'react'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { RatioColumns } from '#console/ui/ratio-text.tsx'
import { type Finding, STATES, type State } from '#shared/checks/model.ts'
import type { ResolvedColorWire, TokenWire } from '#shared/contracts/tokens.contract.ts'
import type { ModelNames } from '#console/lib/finding-words.ts'
import { findingsIn, lowestFinding, passesByGroup } from '#console/lib/lowest-finding.ts'
import { RelationPhrase } from './relation-phrase.tsx'
import { relationTo } from './relation-words.ts'
import { Components, numberOrMissing, SourceHeads } from './token-source.tsx'

/** A theme as the table needs it: its key, its id among findings, and its ground as hex. */
export interface ShippingTheme {
  readonly id: string
  readonly key: string
  readonly ground: string
}

export interface ShipsTableProps {
  readonly token: TokenWire
  readonly themes: readonly ShippingTheme[]
  /** Findings of the head that depend on the token; none while they are being measured. */
  readonly findings: readonly Finding[]
  readonly names: ModelNames
}

/** What leaves the house: the token in every theme and state, how each value was made, and its lowest ratio. */
export function ShipsTable(props: ShipsTableProps) {
  return (
    <div className="ledger [--row-from:88px] overflow-x-clip">
      <table aria-label="As it ships">
        <thead>
          <tr>
            <th className="w-88 @max-[600px]:w-52">Theme</th>
            <th className="w-66 @max-[600px]:w-64">State</th>
            <th className="w-120 @max-[600px]:w-auto">
              <span className="@max-[600px]:hidden">Seen on its ground</span>
              <span className="hidden @max-[600px]:inline">Seen</span>
            </th>
            <th className="w-150 @max-[980px]:hidden">
              <SourceHeads />
            </th>
            <th className="w-136 @max-[600px]:hidden">
              <span className="pl-14">sRGB</span>
            </th>
            <th className="w-145 @max-[1180px]:hidden">Display P3</th>
            <th className="@max-[820px]:hidden">Made by</th>
            <th className="w-129 @max-[600px]:w-104">
              <span className="block w-71 text-end @max-[600px]:w-46">Lowest</span>
            </th>
            <th className="w-178 @max-[1100px]:hidden">Against</th>
          </tr>
        </thead>
        {props.themes.map((theme) => (
          <ThemeRows key={theme.key} {...props} theme={theme} />
        ))}
      </table>
    </div>
  )
}

function ThemeRows({ token, theme, findings, names }: ShipsTableProps & { theme: ShippingTheme }) {
  const resolved = token.resolved[theme.key]
  const states = STATES.filter((state) => resolved?.[state] !== undefined)
  return (
    <tbody>
      {states.map((state, place) => {
        const color = resolved?.[state]
        if (color === undefined) return null
        const lowest = lowestFinding(findingsIn(findings, token.id, theme.id, state))
        return (
          <tr key={state}>
            {place === 0 && (
              <th scope="rowgroup" rowSpan={states.length}>
                <span>{theme.key}</span>
              </th>
            )}
            <ColorCells state={state} color={color} ground={theme.ground} />
            <LowestCells lowest={lowest} token={token.id} names={names} />
          </tr>
        )
      })}
    </tbody>
  )
}

function ColorCells({
  state,
  color,
  ground,
}: {
  state: State
  color: ResolvedColorWire
  ground: string
}) {
  const [l = null, c = null, h = null] = color.oklch.components.map(numberOrMissing)
  return (
    <>
      <td className="row-start">{state}</td>
      <td>
        <svg width="112" height="20" aria-hidden="true" className="own-colors block max-w-full">
          <rect width="112" height="20" fill={ground} />
          <rect x="4" y="4" width="104" height="12" fill={color.hex} />
          <path d="M.5.5h111v19H.5z" fill="none" className="stroke-feint" />
        </svg>
      </td>
      <td className="@max-[980px]:hidden">
        <Components l={l} c={c} h={h} alpha={1} />
      </td>
      <td className="figures @max-[600px]:hidden">
        <span className="pl-14">{color.hex.slice(0, 7)}</span>
        {color.oklch.alpha !== undefined && color.oklch.alpha < 1 && (
          <span className="text-ink-soft"> at {color.oklch.alpha.toFixed(2)}</span>
        )}
      </td>
      <td className="figures text-ink-soft @max-[1180px]:hidden">
        {color.gamut === 'srgb'
          ? 'as sRGB'
          : color.p3.components.map((part) => Number(part).toFixed(3)).join(' ')}
      </td>
      <td className="py-4! pr-2! leading-18 @max-[820px]:hidden">{color.provenance.text}</td>
    </>
  )
}

function LowestCells({
  lowest,
  token,
  names,
}: {
  lowest: Finding | undefined
  token: string
  names: ModelNames
}) {
  if (lowest === undefined) {
    return (
      <>
        <td />
        <td className="@max-[1100px]:hidden" />
      </>
    )
  }
  const isExempt = lowest.outcome === 'exempt'
  const words = (
    <RelationPhrase relation={relationTo(token, lowest, () => false)} nameOf={names.token} />
  )
  return (
    <>
      <td>
        <span className="flex justify-end @min-[600px]:pr-6">
          <RatioColumns
            ratio={lowest.ratio}
            required={isExempt ? 0 : lowest.required}
            outcome={lowest.outcome}
          />
        </span>
        <span className="flex justify-end pb-3 text-12 text-ink-soft @min-[600px]:pr-6 @min-[1100px]:hidden">
          <LowestMark lowest={lowest} />
        </span>
      </td>
      <td
        className="py-4! leading-18 text-ink-soft @max-[1100px]:hidden"
        title={stateInWords(`${lowest.foregroundState}/${lowest.backgroundState}`)}
      >
        <LowestMark lowest={lowest} words={words} />
      </td>
    </>
  )
}

/** The mark of a lowest finding, and what it is against where there is room for that. */
function LowestMark({ lowest, words }: { lowest: Finding; words?: ReactNode }) {
  if (lowest.outcome === 'breach') {
    return <OutcomeMark kind="breach">{words ?? 'breach'}</OutcomeMark>
  }
  if (lowest.outcome === 'exempt') return <OutcomeMark kind="exempt">exempt</OutcomeMark>
  return (
    <>
      {words}
      {passesByGroup(lowest) && (words === undefined ? 'its group passes' : ', its group passes')}
    </>
  )
}
