import { useSuspenseQuery } from '@tanstack/react-query'
import { OwnValues, SetValue } from '#console/features/themes/own-values.tsx'
import { type OwnValue, ownValues, withValue } from '#console/features/themes/theme-draft.ts'
import { readTrial } from '#console/features/tokens/trial.ts'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { ColorSample } from '#console/ui/color-sample.tsx'
import { formatHex } from '#shared/color/format-color.ts'
import { colorOf } from '#shared/checks/resolved.ts'
import type { State } from '#shared/checks/model.ts'
import type { ThemeWire } from '#shared/contracts/themes.contract.ts'
import type { ThemeEdit } from './theme-form.tsx'

/** The values that a theme sets itself, to be taken away or added to. */
export function ThemeValues({
  system,
  theme,
  edit,
}: {
  system: string
  theme: Pick<ThemeWire, 'id' | 'key' | 'from' | 'ground' | 'values'>
  edit: ThemeEdit
}) {
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const names = tokens.map(({ name }) => name)
  const set = (value: { token: string; state: State; value: string | undefined }) =>
    edit.setDraft((draft) => withValue(theme.values, draft, value))
  const isBase = theme.from === undefined
  const hexOf = useHexes(system, theme, edit)
  return (
    <section className="pt-22 pb-36 full:border-l full:border-rule full:pl-44">
      <h2 className="text-16 font-semibold">What it sets itself</h2>
      <OwnValues
        values={ownValues(theme.values, edit.draft.values, names)}
        swatchOf={({ token, state }) => (
          <ColorSample color={hexOf(token, state)} ground={hexOf(theme.ground, 'rest')} />
        )}
        onTakeAway={({ token, state }) => set({ token, state, value: undefined })}
        onPutBack={(value) =>
          edit.setDraft((draft) =>
            withValue(theme.values, draft, {
              token: value.token,
              state: value.state,
              value: standing(theme.values, value),
            }),
          )
        }
      />
      <SetValue
        tokens={names}
        statesOf={(name) => {
          const token = tokens.find((each) => each.name === name)
          return [...(isBase ? [] : (['rest'] as const)), ...(token?.states ?? [])]
        }}
        faultOf={(text) => {
          const reading = readTrial(text, (name) => (names.includes(name) ? name : undefined))
          return reading.kind === 'unread' ? reading.reason : undefined
        }}
        onSet={set}
      />
    </section>
  )
}

const standing = (values: ThemeWire['values'], { token, state }: OwnValue) => values[token]?.[state]

/** Colours in the theme: as tried where something is, else as they ship. */
function useHexes(system: string, theme: Pick<ThemeWire, 'id' | 'key'>, { tried }: ThemeEdit) {
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  return (name: string, state: State): string => {
    const token = tokens.find((each) => each.name === name)
    if (token === undefined) return '#808080'
    if (tried.kind === 'measured') {
      const where = { token: token.id, theme: theme.id, state }
      const { r, g, b, a } = colorOf(tried.evaluation.resolved, where).rendered
      return formatHex(r, g, b, a)
    }
    const states = token.resolved[theme.key]
    return states?.[state]?.hex ?? states?.rest.hex ?? '#808080'
  }
}
