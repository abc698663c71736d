import type { SystemAccess } from '#api/caller.ts'
import { AppError } from '#api/errors.ts'
import type { HeadWriteService } from '#api/features/revisions/head-write.service.ts'
import type { Head, HeadsService } from '#api/features/revisions/heads.service.ts'
import type { NewId } from '#api/platform/ids.ts'
import { etagOf, type IfMatch } from '#api/precondition.ts'
import type { GovernedTheme } from '#shared/checks/governed-model.ts'
import { presentTheme, presentThemeValues } from '#shared/contracts/present-items.ts'
import type { ThemeWire } from '#shared/contracts/themes.contract.ts'
import { presentThemeFile, type ThemeFormat } from './theme-file.presenter.ts'
import {
  decideDelete,
  decidePatch,
  decidePut,
  type PatchThemeBody,
  type PutThemeBody,
} from './themes.rules.ts'

export interface ThemesDeps {
  readonly heads: HeadsService
  readonly writes: HeadWriteService
  readonly newId: NewId
}

/** A write of the theme of one key, meant for one representation of it. */
export interface KeyedEdit {
  readonly key: string
  readonly ifMatch: IfMatch
}

/** Reads themes off the head, also as files, and writes them to it. */
export function createThemesService(deps: ThemesDeps) {
  return { ...themeReads(deps), ...themeWrites(deps) }
}
export type ThemesService = ReturnType<typeof createThemesService>

function themeReads({ heads }: ThemesDeps) {
  return {
    async list(system: SystemAccess): Promise<ThemeWire[]> {
      const head = await heads.current(system.id)
      return head.model.themes.map((theme) => taggedTheme(head, theme))
    },

    async get(system: SystemAccess, key: string): Promise<ThemeWire> {
      const head = await heads.current(system.id)
      return taggedTheme(head, themeOf(head, key))
    },

    async file(
      system: SystemAccess,
      key: string,
      format: ThemeFormat,
    ): Promise<{ text: string; media: string }> {
      const head = await heads.current(system.id)
      const written = presentThemeFile(head, themeOf(head, key), format)
      if (!written.ok) {
        throw new AppError('css-name-collision', { detail: written.details.join(' ') })
      }
      return written.file
    },
  }
}

function themeWrites({ heads, writes, newId }: ThemesDeps) {
  return {
    /** @param edit without `ifMatch`: to be made, where nothing of that key is there */
    async put(
      system: SystemAccess,
      { key, ifMatch }: Omit<KeyedEdit, 'ifMatch'> & { readonly ifMatch: IfMatch | undefined },
      body: PutThemeBody,
    ) {
      const newOne = newId('thm')
      const known = (await heads.current(system.id)).index.themesByKey.get(key)
      const { head, effect } = await writes.write({
        system,
        message: body.message,
        expected: { ifMatch: ifMatch ?? 'nothing-there', current: (now) => findTagged(now, key) },
        decide: ({ index }) => {
          const before = index.themesByKey.get(key)
          const id = before?.id ?? newOne
          return decidePut(index, body, { id, key, before, editsAll: editsAll(system) })
        },
        audit: {
          action: known ? 'theme.edited' : 'theme.created',
          subject: known?.id ?? newOne,
        },
      })
      return { ...taggedTheme(head, themeOf(head, key)), effect }
    },

    async patch(system: SystemAccess, { key, ifMatch }: KeyedEdit, body: PatchThemeBody) {
      const { id } = themeOf(await heads.current(system.id), key)
      const { head, effect } = await writes.write({
        system,
        message: body.message,
        expected: { ifMatch, current: (now) => taggedTheme(now, themeOf(now, key)) },
        decide: (now) => {
          const before = themeOf(now, key)
          const edit = { id: before.id, key, before, editsAll: editsAll(system) }
          return decidePatch(now.index, body, edit)
        },
        audit: { action: 'theme.edited', subject: id },
      })
      return { ...taggedTheme(head, themeOf(head, key)), effect }
    },

    async remove(
      system: SystemAccess,
      { key, ifMatch }: KeyedEdit,
      message: string | undefined,
    ): Promise<void> {
      const { id } = themeOf(await heads.current(system.id), key)
      await writes.write({
        system,
        message,
        expected: { ifMatch, current: (now) => taggedTheme(now, themeOf(now, key)) },
        decide: (now) => decideDelete(now.index, themeOf(now, key), editsAll(system)),
        audit: { action: 'theme.deleted', subject: id },
      })
    },
  }
}
/** An accessibility lead edits level and gating only. */
const editsAll = ({ role }: SystemAccess) => role === 'maintainer' || role === 'admin'

function themeOf({ index }: Head, key: string): GovernedTheme {
  const theme = index.themesByKey.get(key)
  if (theme === undefined) throw new AppError('not-found', { detail: `No theme ${key}` })
  return theme
}

function findTagged(head: Head, key: string): ThemeWire | undefined {
  const theme = head.index.themesByKey.get(key)
  return theme && taggedTheme(head, theme)
}

function taggedTheme({ index }: Head, theme: GovernedTheme): ThemeWire {
  const wire = { ...presentTheme(theme, index), values: presentThemeValues(theme, index) }
  return { ...wire, etag: etagOf(wire) }
}
