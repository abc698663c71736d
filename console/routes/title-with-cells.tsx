import { useSuspenseQuery } from '@tanstack/react-query'
import { type Ref, useMemo } from 'react'
import { themeQueries } from '#console/features/themes/themes.queries.ts'
import { CaptionedCell, TokenTitle } from '#console/features/tokens/token-title.tsx'
import { TokenCell } from '#console/features/tokens/token-cell.tsx'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { evaluatedHalf } from '#console/features/tokens/tried-cell.ts'
import { Arrow } from '#console/ui/ratio-text.tsx'
import { StripCell } from '#console/ui/strip-cell.tsx'
import { useNarrow } from '#console/ui/window-size.ts'
import type { Evaluation } from '#shared/checks/evaluation.ts'
import { findingsOf } from '#shared/checks/token-standing.ts'
import type { TokenWire } from '#shared/contracts/tokens.contract.ts'
import { useStripBands } from './system-frame.tsx'

/** The token's title, and beside it the present cell → the tried cell. */
export function TitleWithCells({
  system,
  token,
  title,
  tried,
}: {
  system: string
  token: TokenWire
  title: Ref<HTMLHeadingElement>
  tried: Evaluation | undefined
}) {
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const { data: strip } = useSuspenseQuery(tokenQueries.strip(system))
  const { shown, bands } = useStripBands(system)
  const ledgerToken = tokens.find(({ id }) => id === token.id)
  const size = useNarrow() ? 'row' : 'title'
  const triedHalves = useTriedHalves(system, token.id, tried)
  if (ledgerToken === undefined) return null
  return (
    <TokenTitle
      token={{ ...ledgerToken, ...token }}
      followers={tokens.filter(({ value }) => isAliasOf(value, token.name)).map(({ name }) => name)}
      themes={strip.find(({ name }) => name === token.name)?.themes ?? []}
      title={title}
    >
      {shown !== undefined && (
        <div className="flex flex-wrap items-start gap-y-10">
          <CaptionedCell caption="present">
            <TokenCell
              name={token.name}
              resolved={token.resolved}
              shown={shown}
              breach={bands.find(({ name }) => name === token.name)?.breach}
              size={size}
            />
          </CaptionedCell>
          {triedHalves !== undefined && (
            <>
              <span className="flex h-28 items-center wide:mx-8 wide:h-38">
                <Arrow />
              </span>
              <CaptionedCell caption="tried">
                <StripCell size={size} label={`${token.name} as tried`} {...triedHalves} />
              </CaptionedCell>
            </>
          )}
        </div>
      )}
    </TokenTitle>
  )
}

function isAliasOf(value: TokenWire['value'], name: string): boolean {
  const alias = typeof value === 'string' ? value : 'derive' in value ? value.derive : undefined
  return alias === `{${name}}`
}

function useTriedHalves(system: string, token: string, tried: Evaluation | undefined) {
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const { shown } = useStripBands(system)
  return useMemo(() => {
    if (tried === undefined || shown === undefined) return undefined
    const findings = findingsOf(tried, token).map(({ finding }) => finding)
    const half = (key: string) => {
      const theme = themes.find((each) => each.key === key)
      const model = tried.resolved.model.themes.find(({ id }) => id === theme?.id)
      if (model === undefined) throw new TypeError(`the model has no theme ${key}`)
      return evaluatedHalf(tried, { token, theme: model.id, ground: model.ground }, findings)
    }
    return { light: half(shown.light), dark: half(shown.dark) }
  }, [tried, token, themes, shown])
}
