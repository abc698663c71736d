import type { Page } from 'playwright-core'

/** Where on a page a ratio stands, and so what it claims to be. */
export type RatioPlace = 'tokens' | 'pairs' | 'moves' | 'ships' | 'breaches' | 'history' | 'steps'

/** A ratio as a person reads it, with the words beside it that say what it is the ratio of. */
export interface ScreenRatio {
  readonly place: RatioPlace
  /** Among those of its place. */
  readonly index: number
  readonly text: string
  /** `of 4.5`, or nothing. */
  readonly required: string
  /** The figure before the arrow, where a trial moves it. */
  readonly before: string | undefined
  /** Accessible name of the row's link. */
  readonly label: string
  /** The row's parts, in order. */
  readonly parts: readonly string[]
  /** The row group it stands in: a theme. */
  readonly group: string
}

export interface ScreenRatios {
  readonly ratios: readonly ScreenRatio[]
  /** Text that reads as a ratio and is not among them. */
  readonly strays: readonly string[]
}

/** Every ratio that a page of the console shows now. */
export function readRatios(page: Page): Promise<ScreenRatios> {
  return page.evaluate(() => {
    const words = (element: Element | null | undefined) =>
      element?.textContent?.replace(/\s+/g, ' ').trim() ?? ''

    function placeOf(element: Element): RatioPlace {
      if (element.closest('svg')) return 'steps'
      const heading = words(element.closest('section:has(> h2)')?.querySelector('h2'))
      if (heading === 'History') return 'history'
      if (heading === 'Its pairs') return 'pairs'
      if (heading === 'What the tried colour would move') return 'moves'
      if (heading === 'As it ships') return 'ships'
      const row = element.closest('tr, li')?.querySelector('a[aria-label]')
      return row?.getAttribute('aria-label')?.startsWith('Breach ') ? 'breaches' : 'tokens'
    }

    const seen = new Map<RatioPlace, number>()
    function read(figure: Element) {
      const row = figure.closest('tr, li')
      const place = placeOf(figure)
      const index = seen.get(place) ?? 0
      seen.set(place, index + 1)
      const beside = words(figure.nextElementSibling)
      return {
        place,
        index,
        text: words(figure),
        required: beside.startsWith('of ') ? beside : '',
        before: row?.querySelector('[data-ratio=before]')?.textContent ?? undefined,
        label: row?.querySelector('a[aria-label]')?.getAttribute('aria-label') ?? '',
        parts: [...(row?.children ?? [])].map(words),
        group: words(figure.closest('tbody')?.querySelector('th')),
      }
    }

    function strayTexts(): string[] {
      const strays: string[] = []
      const walker = document.createTreeWalker(document.body, NodeFilter.SHOW_TEXT)
      for (let node = walker.nextNode(); node; node = walker.nextNode()) {
        const text = node.textContent ?? ''
        // A factor of a rule, `chroma × 1.05`, is none.
        const isRatio = /(?<!× |[\d.])(?:[1-9]|1\d|2[01])\.\d\d(?![\d.])/.test(text)
        if (isRatio && !node.parentElement?.closest('[data-ratio]')) strays.push(text)
      }
      return strays
    }

    const shown = [
      ...document.querySelectorAll('[data-ratio]:not([data-ratio=before], [data-ratio=lowest])'),
    ]
    return {
      ratios: shown.filter((figure) => figure.checkVisibility()).map(read),
      strays: strayTexts(),
    }
  })
}
