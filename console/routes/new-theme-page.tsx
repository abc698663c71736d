import { useMutation, useSuspenseQuery } from '@tanstack/react-query'
import { type FormEvent, useMemo, useState } from 'react'
import { type LoaderFunctionArgs, useNavigate, useParams, useSearchParams } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'
import { EffectOnVerdicts } from '#console/features/checks/effect-list.tsx'
import { memberQueries } from '#console/features/members/members.queries.ts'
import { systemQueries } from '#console/features/systems/systems.queries.ts'
import type { DraftedTheme } from '#console/features/themes/theme-draft.ts'
import { createTheme, themeQueries } from '#console/features/themes/themes.queries.ts'
import { tokenQueries } from '#console/features/tokens/tokens.queries.ts'
import { queryClient } from '#console/lib/query-client.ts'
import { faultAt, writeRefusal } from '#console/lib/refusal.ts'
import { DecisionLine } from '#console/ui/decision-line.tsx'
import { LineField } from '#console/ui/line-field.tsx'
import { slugSchema } from '#shared/contracts/fields.ts'
import type { ThemeWire } from '#shared/contracts/themes.contract.ts'
import { useEvaluation } from './evaluation.ts'
import { useModelNames } from './model-names.ts'
import { RefusedWrite } from './refused-write.tsx'
import { useThemeEdit } from './theme-edit.ts'
import { type ThemeEdit, ThemeMembers } from './theme-form.tsx'
import { themeSpan } from './theme-span.ts'
import { ThemeValues } from './theme-values.tsx'
import { useWhoMay } from './who-may.ts'

export async function loader({ params: { system = '' } }: LoaderFunctionArgs) {
  await Promise.all([
    queryClient.ensureQueryData(tokenQueries.ledger(system)),
    queryClient.ensureQueryData(memberQueries.all(system)),
  ])
  return null
}

const NEW_THEME = 'new-theme'

/** A theme to be made from a parent: at first the parent with ground and ink exchanged. */
export function Component() {
  const { system = '' } = useParams()
  const [search] = useSearchParams()
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  const parent = themes.find(({ key }) => key === search.get('from')) ?? themes[0]
  return (
    <>
      <title>{`New theme of ${system} · Dyewright`}</title>
      {parent !== undefined && <NewTheme key={parent.id} system={system} parent={parent} />}
    </>
  )
}

function NewTheme({ system, parent }: { system: string; parent: ThemeWire }) {
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const { data: evaluation } = useEvaluation(system, settings.head.revision)
  const [key, setKey] = useState('')
  const theme = useMemo<DraftedTheme>(
    () => ({
      id: NEW_THEME,
      key,
      name: '',
      position: 0,
      from: parent.key,
      ground: parent.ground,
      ink: parent.ink,
      rule: { kind: 'mirror' },
      gating: true,
    }),
    [key, parent],
  )
  const edit = useThemeEdit(theme, evaluation, useExchanged(system, parent))
  const names = useModelNames(system)
  return (
    <>
      <h2 className="pt-18 pb-12 text-16 font-semibold">A new theme</h2>
      <NewThemeForm system={system} theme={edit.drafted} edit={edit} onKey={setKey} />
      <div className="grid gap-x-44 full:grid-cols-2">
        <EffectOnVerdicts
          tried={edit.tried}
          unmoved="No verdict moves: every declared pair names the themes in which it occurs, and this is none of them yet."
          names={{
            token: names.token,
            theme: (id) => (id === NEW_THEME ? key || 'the new theme' : names.theme(id)),
          }}
        />
        <ThemeValues system={system} theme={{ ...edit.drafted, values: {} }} edit={edit} />
      </div>
    </>
  )
}

/** Ground and ink of the parent, each in the other's colour: a start that always resolves. */
function useExchanged(system: string, parent: ThemeWire) {
  const { data: tokens } = useSuspenseQuery(tokenQueries.ledger(system))
  const [start] = useState(() => {
    const span = themeSpan(parent, tokens)
    return {
      values: { [parent.ground]: { rest: span.ink }, [parent.ink]: { rest: span.ground } },
    }
  })
  return start
}

function NewThemeForm({
  system,
  theme,
  edit,
  onKey,
}: {
  system: string
  theme: DraftedTheme
  edit: ThemeEdit
  onKey: (key: string) => void
}) {
  const navigate = useNavigate()
  const [message, setMessage] = useState('')
  const keyFault = useKeyFault(system, theme.key)
  const obstacle = useObstacle(system, { theme, edit, keyFault })
  const making = useMutation({
    mutationFn: createTheme,
    onSuccess: async ({ key }) => {
      await queryClient.invalidateQueries({ queryKey: ['system', system] })
      await navigate(paths.theme(system, key))
    },
  })
  const refusal = making.isError ? writeRefusal(making.error) : undefined
  const submit = (event: FormEvent) => {
    event.preventDefault()
    if (obstacle !== undefined || making.isPending) return
    making.mutate({ system, drafted: theme, values: edit.draft.values ?? {}, message })
  }
  return (
    <form onSubmit={submit} className="border-b border-ink pb-18">
      <LineField
        label="Key, in addresses and file names"
        value={theme.key}
        autoComplete="off"
        spellCheck={false}
        fault={keyFault}
        onChange={(event) => onKey(event.target.value)}
        className="mb-14 w-full wide:w-200"
      />
      <ThemeMembers system={system} theme={theme} edit={edit} refusal={refusal} />
      <DecisionLine
        message={message}
        onMessage={setMessage}
        messageFault={faultAt(refusal, '/message')}
        isEdited={edit.isEdited}
        isSaving={making.isPending}
        obstacle={obstacle}
        action="Make the theme"
        onPutBack={edit.putBack}
      />
      {refusal !== undefined && (
        <RefusedWrite
          refusal={
            refusal.kind === 'changed'
              ? { ...refusal, title: 'Somebody has made a theme of this key meanwhile.' }
              : refusal
          }
        />
      )}
    </form>
  )
}

function useKeyFault(system: string, key: string): string | undefined {
  const { data: themes } = useSuspenseQuery(themeQueries.all(system))
  if (key === '') return undefined
  if (themes.some((theme) => theme.key === key)) return `There is a theme ${key} already.`
  return slugSchema.safeParse(key).success
    ? undefined
    : 'Lower-case letters, digits and single hyphens.'
}

function useObstacle(
  system: string,
  {
    theme,
    edit,
    keyFault,
  }: { theme: DraftedTheme; edit: ThemeEdit; keyFault?: string | undefined },
): string | undefined {
  const { data: settings } = useSuspenseQuery(systemQueries.one(system))
  const who = useWhoMay(system)
  if (!who.is('maintainer')) {
    return `Trying is for everyone; making a theme takes a maintainer.${who.oneOf('maintainer')}`
  }
  if (settings.writeMode === 'review') return 'This system takes edits by review only.'
  if (theme.key === '') return 'It has no key yet.'
  if (keyFault !== undefined) return keyFault
  if (theme.name.trim() === '') return 'It has no name yet.'
  if (!edit.isRuleRead) return 'A field of the rule holds no number.'
  if (edit.faults.length > 0) return `${edit.faults[0]?.detail}.`
  return edit.tried.kind === 'unresolvable'
    ? 'The colours cannot be resolved like this.'
    : undefined
}
