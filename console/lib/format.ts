/** Lightness or chroma, three decimals. */
export function formatComponent(value: number | null): string {
  return value === null ? 'none' : value.toFixed(3)
}

export function formatHue(value: number | null): string {
  return value === null ? 'none' : `${Math.round(value) % 360}°`
}

export function startSentence(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1)
}

/** `a`, `a and b`, `a, b and c`. */
export function joinWords(words: readonly string[]): string {
  const last = words.at(-1)
  return words.length < 2 ? (last ?? '') : `${words.slice(0, -1).join(', ')} and ${last}`
}

const dayMonth = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short' })
const dayMonthYear = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'short',
  year: 'numeric',
})
const dayLong = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'long' })
const clock = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit' })

/** `12 Oct`, with its year where that is not the present one. */
export function formatDay(iso: string, now = new Date()): string {
  const date = new Date(iso)
  return date.getFullYear() === now.getFullYear()
    ? dayMonth.format(date)
    : dayMonthYear.format(date)
}

/** `12 October` */
export function formatLongDay(iso: string): string {
  return dayLong.format(new Date(iso))
}

/** `today at 09:42`, else `12 October at 09:42`. */
export function formatMoment(iso: string, now = new Date()): string {
  const date = new Date(iso)
  const day = date.toDateString() === now.toDateString() ? 'today' : dayLong.format(date)
  return `${day} at ${clock.format(date)}`
}
