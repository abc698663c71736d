import type { RenderedColor } from '#shared/color/render.ts'

/** One token of a theme as it ships, `rest` among its states. */
export interface ThemeToken {
  /** Dot path. */
  readonly name: string
  readonly description?: string
  readonly deprecated?: boolean | string
  readonly states: readonly { readonly state: string; readonly rendered: RenderedColor }[]
}
