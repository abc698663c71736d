import { STATES, type State } from '#shared/checks/model.ts'

export const SHEET_USES = ['any', 'text', 'non-text'] as const

export const SHEET_ORDERS = [
  { value: 'short', text: 'furthest short first' },
  { value: 'ledger', text: 'in ledger order' },
] as const

/** What the sheet shows; it lives in the address. */
export interface SheetView {
  /** Theme key. */
  readonly theme: string
  readonly state: State
  readonly use: (typeof SHEET_USES)[number]
  /** A product, or all. */
  readonly product: string
  readonly order: (typeof SHEET_ORDERS)[number]['value']
}

/** Reads the address; a theme that is not there gives way to the base. */
export function readSheetView(search: URLSearchParams, themes: readonly string[]): SheetView {
  const asked = search.get('theme') ?? ''
  return {
    theme: themes.includes(asked) ? asked : (themes[0] ?? ''),
    state: STATES.find((state) => state === search.get('state')) ?? 'rest',
    use: SHEET_USES.find((use) => use === search.get('use')) ?? 'any',
    product: search.get('product') ?? 'all',
    order: search.get('order') === 'ledger' ? 'ledger' : 'short',
  }
}

/** The address of a view; only what differs from the first one stands in it. */
export function writeSheetView(view: SheetView, base: string): string {
  const first: SheetView = {
    theme: base,
    state: 'rest',
    use: 'any',
    product: 'all',
    order: 'short',
  }
  const search = new URLSearchParams()
  for (const [name, value] of Object.entries(view)) {
    if (value !== first[name as keyof SheetView]) search.set(name, value)
  }
  return search.size === 0 ? '' : `?${search}`
}
