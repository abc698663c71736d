import { queryOptions } from '@tanstack/react-query'
import { call } from '#console/lib/api.ts'
import { deleteTheme, listThemes, patchTheme, putTheme } from '#shared/contracts/themes.contract.ts'
import type { DraftedTheme, ThemeDraft } from './theme-draft.ts'

export const themeQueries = {
  all: (system: string) =>
    queryOptions({
      queryKey: ['system', system, 'themes'],
      queryFn: async () => (await call(listThemes, { params: { system } })).body.items,
    }),
}

interface ThemeWrite {
  readonly system: string
  readonly theme: string
  readonly message: string
}

const said = (message: string) => (message.trim() === '' ? {} : { message })

/** Writes what a draft changes to the head; answers the theme and what that did. */
export async function saveTheme({
  system,
  theme,
  etag,
  draft,
  message,
}: ThemeWrite & { readonly etag: string; readonly draft: ThemeDraft }) {
  return (
    await call(patchTheme, {
      params: { system, theme },
      ifMatch: etag,
      body: { ...draft, ...said(message) },
    })
  ).body
}

/** Makes a theme where none has its key. */
export async function createTheme({
  system,
  drafted,
  values,
  message,
}: Omit<ThemeWrite, 'theme'> & {
  readonly drafted: DraftedTheme
  readonly values: NonNullable<ThemeDraft['values']>
}) {
  const { id: _, key, position: __, ...members } = drafted
  const set = Object.entries(values).flatMap(([token, byState]) =>
    byState === null ? [] : [[token, byState] as const],
  )
  return (
    await call(putTheme, {
      params: { system, theme: key },
      ifNoneMatch: '*',
      body: { ...members, values: Object.fromEntries(set), ...said(message) },
    })
  ).body
}

export async function removeTheme({ system, theme, etag, message }: ThemeWrite & { etag: string }) {
  await call(deleteTheme, { params: { system, theme }, ifMatch: etag, query: said(message) })
}
