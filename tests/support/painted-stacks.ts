import type { Page } from 'playwright-core'
import { PNG } from 'pngjs'

/** Custom properties from the bottom up, as they are written after `var(`. */
export type Stack = readonly string[]
/** Red, green, blue, 0 to 255, in the color space of the screen. */
export type Painted = readonly [number, number, number]

const CELL = 4
const COLUMNS = 256
const ROWS = 160
const HOST = 'http://painted.test'

/** A window that `paintStacks` fills. */
export const PAINTED_VIEWPORT = { width: COLUMNS * CELL, height: ROWS * CELL }

/**
 * Paints each stack as boxes laid over one another, in colors of the style sheet alone, and reads the pixels of
 * screenshots.
 */
export async function paintStacks(
  page: Page,
  styleSheet: string,
  stacks: readonly Stack[],
): Promise<Painted[]> {
  await page.route(`${HOST}/**`, (route) =>
    route.request().url().endsWith('/theme.css')
      ? route.fulfill({ contentType: 'text/css; charset=utf-8', body: styleSheet })
      : route.fulfill({
          contentType: 'text/html; charset=utf-8',
          body: '<!doctype html><link rel=stylesheet href=theme.css><body style="margin:0">',
        }),
  )
  await page.goto(`${HOST}/`)
  const painted: Painted[] = []
  for (let from = 0; from < stacks.length; from += COLUMNS * ROWS) {
    const shown = stacks.slice(from, from + COLUMNS * ROWS)
    await page.evaluate(layOut, { shown, cell: CELL, columns: COLUMNS })
    const picture = PNG.sync.read(await page.screenshot())
    for (const at of shown.keys()) {
      const x = (at % COLUMNS) * CELL + CELL / 2
      const y = Math.floor(at / COLUMNS) * CELL + CELL / 2
      const [r, g, b] = picture.data.subarray((y * picture.width + x) * 4)
      painted.push([r!, g!, b!])
    }
  }
  await page.unroute(`${HOST}/**`)
  return painted
}

/** Runs in the page. */
function layOut(told: { shown: readonly Stack[]; cell: number; columns: number }): void {
  const { shown, cell, columns } = told
  const boxes = shown.flatMap((stack, at) =>
    stack.map((property) => {
      const box = document.createElement('div')
      box.style.position = 'absolute'
      box.style.left = `${(at % columns) * cell}px`
      box.style.top = `${Math.floor(at / columns) * cell}px`
      box.style.width = box.style.height = `${cell}px`
      box.style.background = `var(${property})`
      return box
    }),
  )
  document.body.replaceChildren(...boxes)
}
