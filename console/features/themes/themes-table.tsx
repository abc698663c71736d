import { Link, useNavigate } from 'react-router-dom'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { PairSample } from '#console/ui/pair-sample.tsx'
import { RatioColumns } from '#console/ui/ratio-text.tsx'
import { type RowLinkProps, useRowWalk } from '#console/ui/row-walk.ts'
import { countInWords } from '#shared/checks/finding-words.ts'
import type { ThemeWire } from '#shared/contracts/themes.contract.ts'
import type { DerivedTheme } from './derivation.ts'
import { gatingInWords } from './theme-versions.ts'

/** A theme's ground and ink as they ship, and what they measure. */
export interface ThemeSpan {
  readonly ground: string
  readonly ink: string
  readonly ratio: number
}

/** Ink to ground must reach this, in every theme. */
const SPAN_REQUIRED = 4.5

interface RowParts {
  readonly href: (key: string) => string
  readonly spanOf: (theme: ThemeWire) => ThemeSpan
  readonly ruleInWords: (theme: ThemeWire) => string
  readonly levelInWords: (theme: ThemeWire) => string
  /** Findings that breach in it now; none while they are being measured. */
  readonly breachesIn: (theme: ThemeWire) => number | undefined
}

/** The themes, each under the one that it derives from. */
export function ThemesTable({ themes, ...parts }: RowParts & { themes: readonly DerivedTheme[] }) {
  const walk = useRowWalk(themes.length)
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: the arrows walk the row links inside, which are operable
    <div ref={walk.container} onKeyDown={walk.onKeyDown} className="ledger mt-16">
      <table aria-label="Themes">
        <thead>
          <tr>
            <th className="w-[22%] @max-[700px]:w-auto">Theme</th>
            <th className="w-108">Ground, ink</th>
            <th className="w-112 @max-[820px]:hidden">
              <span className="block w-54 text-end">Ratio</span>
            </th>
            <th className="@max-[700px]:hidden">Its colours</th>
            <th className="w-150 @max-[980px]:hidden">Level</th>
            <th className="number w-60 @max-[980px]:hidden">Own</th>
            <th className="w-140 @max-[460px]:w-110">
              <span className="@min-[460px]:pl-28">Breaches</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {themes.map((derived, index) => (
            <ThemeRow
              key={derived.theme.id}
              derived={derived}
              link={walk.rowLink(index)}
              {...parts}
            />
          ))}
        </tbody>
      </table>
    </div>
  )
}

function ThemeRow({
  derived: { theme, depth },
  link,
  href,
  spanOf,
  ruleInWords,
  levelInWords,
  breachesIn,
}: RowParts & { derived: DerivedTheme; link: RowLinkProps }) {
  const navigate = useNavigate()
  const span = spanOf(theme)
  const words = ruleInWords(theme)
  return (
    <tr
      data-opens
      onClick={(event) => {
        if (!(event.target instanceof HTMLAnchorElement)) void navigate(href(theme.key))
      }}
    >
      <td className="row-start">
        <span className="flex items-baseline gap-x-8" style={{ paddingLeft: depth * 18 }}>
          <Link to={href(theme.key)} {...link} className="min-w-0 py-6 font-semibold break-words">
            {theme.key}
          </Link>
          <span className="min-w-0 truncate text-ink-soft @max-[460px]:hidden">{theme.name}</span>
        </span>
        <span
          className="-mt-4 mb-6 hidden pr-10 text-13 text-ink-soft @max-[700px]:block"
          style={{ paddingLeft: depth * 18 }}
        >
          Its colours {words}
        </span>
      </td>
      <td>
        <PairSample foreground={span.ink} background={span.ground} breaches={false} />
      </td>
      <td className="@max-[820px]:hidden">
        <RatioColumns ratio={span.ratio} required={SPAN_REQUIRED} outcome="pass" />
      </td>
      <td className="py-6! pr-16! text-ink-soft @max-[700px]:hidden">{words}</td>
      <td className="text-ink-soft @max-[980px]:hidden">
        {levelInWords(theme)}, {gatingInWords(theme)}
      </td>
      <td className="number figures @max-[980px]:hidden">{Object.keys(theme.values).length}</td>
      <td>
        <span className="block @min-[460px]:pl-28">
          <BreachCount count={breachesIn(theme)} />
        </span>
      </td>
    </tr>
  )
}

function BreachCount({ count }: { count: number | undefined }) {
  if (count === undefined) return <span className="text-ink-soft">measuring</span>
  return count === 0 ? (
    <span className="text-ink-soft">none</span>
  ) : (
    <OutcomeMark kind="breach">{countInWords(count)}</OutcomeMark>
  )
}
