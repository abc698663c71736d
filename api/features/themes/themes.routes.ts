import { type ApiRouter, mount } from '#api/http/route.ts'
import { addressOf } from '#shared/contracts/route.ts'
import {
  deleteTheme,
  getTheme,
  getThemeFile,
  listThemes,
  patchTheme,
  putTheme,
} from '#shared/contracts/themes.contract.ts'
import type { ThemesService } from './themes.service.ts'

export function mountThemes(router: ApiRouter, themes: ThemesService): void {
  mount(router, listThemes, async ({ system }) => ({
    body: { items: await themes.list(system) },
  }))
  mount(router, getTheme, async ({ system, params }) => ({
    body: await themes.get(system, params.theme),
  }))
  mount(router, getThemeFile, ({ system, params }) =>
    themes.file(system, params.theme, params.format),
  )
  mount(router, putTheme, async ({ system, params, ifMatch, createOnly, body }) => ({
    body: await themes.put(
      system,
      { key: params.theme, ifMatch: createOnly ? undefined : ifMatch },
      body,
    ),
    location: createOnly ? addressOf(getTheme, params) : undefined,
  }))
  mount(router, patchTheme, async ({ system, params, ifMatch, body }) => ({
    body: await themes.patch(system, { key: params.theme, ifMatch }, body),
  }))
  mount(router, deleteTheme, async ({ system, params, ifMatch, query }) => {
    await themes.remove(system, { key: params.theme, ifMatch }, query.message)
    return undefined
  })
}
