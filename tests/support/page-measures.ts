import type { Page } from 'playwright-core'

/** What stands out to the right of the window, where the page can be scrolled sideways. */
export function sidewaysScroll(page: Page): Promise<string[]> {
  return page.evaluate(() => {
    const { scrollWidth, clientWidth } = document.documentElement
    if (scrollWidth <= clientWidth) return []
    const wide = [...document.querySelectorAll('body *')]
      .filter((element) => element.getBoundingClientRect().right > clientWidth + 1)
      .map((element) => `${element.tagName}.${element.getAttribute('class')}`)
    return [`${scrollWidth} wide in ${clientWidth}: ${wide.slice(-3).join(' | ')}`]
  })
}

/** Where any of the first lies over any of the second. */
export function overlaps(page: Page, first: string, second: string): Promise<string[]> {
  return page.evaluate(
    ([one = '', other = '']) =>
      [...document.querySelectorAll(one)].flatMap((upper) =>
        [...document.querySelectorAll(other)].flatMap((lower) => {
          const [a, b] = [upper.getBoundingClientRect(), lower.getBoundingClientRect()]
          const isOver =
            a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom
          return isOver ? [`${one} "${upper.textContent}" lies over ${other}`] : []
        }),
      ),
    [first, second],
  )
}

/** A control that has the focus, as it can be told from others and seen. */
interface Focused {
  readonly place: number
  readonly name: string
  readonly fault: string | undefined
}

/** Walks the page by Tab: controls that are not reached, not outlined (2 px at least), or not in view. */
export async function focusFaults(page: Page): Promise<string[]> {
  const controls = await markControls(page)
  const reached = new Set<number>()
  const faults: string[] = []
  for (let presses = 0; presses < controls.length + 5; presses++) {
    await page.keyboard.press('Tab')
    const focused = await readFocus(page)
    if (focused === undefined || reached.has(focused.place)) break
    reached.add(focused.place)
    if (focused.fault !== undefined) faults.push(`${focused.name}: ${focused.fault}`)
  }
  const missed = controls.filter((_, place) => !reached.has(place))
  if (controls.length === 0) faults.push('the page has no control at all')
  return [...faults, ...missed.map((name) => `${name}: not reached`)]
}

/** Numbers everything that Tab should stop at. */
function markControls(page: Page): Promise<string[]> {
  return page.evaluate(() => {
    const focusable = 'a[href], button, input, select, textarea, summary, [tabindex]'
    return [...document.querySelectorAll<HTMLElement>(focusable)]
      .filter(
        (element) =>
          element.tabIndex >= 0 &&
          !element.matches(':disabled') &&
          element.checkVisibility({ visibilityProperty: true }) &&
          element.closest('[aria-hidden=true], [inert]') === null,
      )
      .map((element, place) => {
        element.dataset.place = String(place)
        return `${element.tagName} "${element.ariaLabel ?? element.textContent}"`
      })
  })
}

function readFocus(page: Page): Promise<Focused | undefined> {
  return page.evaluate(() => {
    const element = document.activeElement
    if (!(element instanceof HTMLElement || element instanceof SVGElement)) return undefined
    if (element === document.body) return undefined
    // A row that opens what its link opens has the outline for it, some on what is drawn before its cell.
    const row = element.closest('tr, li')
    const styles = [
      getComputedStyle(element),
      ...(row ? [getComputedStyle(row)] : []),
      ...[...(row?.children ?? [])].map((cell) => getComputedStyle(cell, '::before')),
    ]
    const isOutlined = styles.some(
      ({ outlineStyle, outlineWidth, outlineColor }) =>
        outlineStyle === 'solid' &&
        Number.parseFloat(outlineWidth) >= 2 &&
        !/^rgba.* 0\)$/.test(outlineColor),
    )
    // A field is a line: with the focus it is 2 px.
    const { borderBottomWidth } = getComputedStyle(element)
    const isLined = element.matches('input, textarea') && Number.parseFloat(borderBottomWidth) >= 2
    const { left, top, right, bottom } = element.getBoundingClientRect()
    const middle = [(left + right) / 2, (top + bottom) / 2] as const
    const over = document.elementFromPoint(...middle)
    const isInView = over !== null && (element.contains(over) || over.contains(element))
    return {
      place: Number(element.dataset.place ?? -1),
      name: `${element.tagName} "${element.ariaLabel ?? element.textContent}"`,
      fault:
        isOutlined || isLined
          ? isInView
            ? undefined
            : `not in view at ${middle}, under ${over?.tagName} "${over?.textContent?.slice(0, 40)}"`
          : 'not outlined',
    }
  })
}
