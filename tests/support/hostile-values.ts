import type { Random } from './random.ts'

export const SOUND_NAMES = ['deck', 'ink', 'accent', 'glass', 'action.board.fill'] as const
export const SOUND_COLORS = ['#fff', '#000', '#2283c1', 'oklch(0.6 0.2 140)', '{deck}'] as const

const nested = (depth: number): unknown => JSON.parse(`${'['.repeat(depth)}1${']'.repeat(depth)}`)

const NAMES = [
  ...['nowhere', 'é.ü', 'e\u0301.u\u0308', '💧.drop', 'constructor', '__proto__', 'deck ', 'Deck'],
  ...['state-hover.x', 'x'.repeat(255), 'x'.repeat(256), 'a/b~c', '$x', 'a..b', '.', 'عربى'],
]
const COLORS = [
  ...['oklch(1e308 1e308 1e308)', 'oklch(0.5 1e308 20)', 'oklch(none none none / none)', '{'],
  ...['oklch(calc(infinity) 0 0)', 'color(xyz 9 9 9)', 'currentColor', 'var(--x)', '{nowhere}'],
  ...['rgb(from red r g b)', 'lab(50% 9999 -9999)', 'transparent', '{{deck}}', '#ggg', '{ink}'],
]
/** What a member of a body may be instead of what is asked for. */
const VALUES: readonly unknown[] = [
  ...[null, true, 0, -0, -1, 1.5, 22, 1e308, -1e308, 5e-324, 2 ** 53, '', ' ', '\u0000', '\ud83d'],
  ...['\u202e', '\ufeff', '💧'.repeat(200), 'x'.repeat(5000), '2026-02-30', '0000-00-00', '../x'],
  ...["'; drop table tokens; --", '<script>', [], {}, [[]], [null], { '': 1 }, { constructor: 1 }],
  ...[nested(20), nested(40), Array.from({ length: 400 }, (_, at) => at), ['deck', 'nowhere', 1]],
  { derive: '{ink}' },
  { derive: '{deck}', lightness: 1e308 },
  { derive: '{deck}', hue: -1e308, chroma: 1e308, alpha: 0 },
  { colorSpace: 'oklch', components: ['none', 'none', 'none'], alpha: 0 },
  { colorSpace: 'oklch', components: [0.5, 1e308, 20] },
  { colorSpace: 'srgb', components: 'red' },
  { light: { rest: null } },
  { kind: 'decorative', reason: 'A drawing' },
  ...NAMES,
  ...COLORS,
]

/** What stands in an address or a query, percent-encoded where it can be. */
export const ADDRESS_PARTS: readonly string[] = [
  ...['%2F', '%00', '%zz', '%C3%28', '%ED%A0%80', '%F0%9F%92%A7', '-1', '0', '01', '1e3', '+1'],
  ...['99999999999999999999', 'constructor', '__proto__', 'x'.repeat(900), 'light.', '.css', '*'],
  ...['light.nope', 'dark.%00', 'a%20b', 'DECK', '%EF%BB%BF', 'NaN', '2026-02-30', 'W10', 'bnVsbA'],
]

export const HEADERS: readonly (readonly [name: string, value: string])[] = [
  ...['*', 'W/"x"', 'garbage', '"', ',,,', '*, "x"'].map((tag) => ['If-Match', tag] as const),
  ...['*', 'garbage', '*,*'].map((tag) => ['If-None-Match', tag] as const),
  ...['image/png', ';;;', '*/*;q=0', 'text/html', 'application/sarif+json', 'a/b;q=x'].map(
    (media) => ['Accept', media] as const,
  ),
  ...['text/plain', 'multipart/form-data', 'application/json; charset=utf-16', 'x'].map(
    (type) => ['Content-Type', type] as const,
  ),
  ...['a', '""', '"', 'a b', '"a";p=1', 'x'.repeat(256)].map(
    (key) => ['Idempotency-Key', key] as const,
  ),
  ...['Bearer', 'Bearer x', 'Basic YTpi'].map((field) => ['Authorization', field] as const),
  ['Cookie', 'dyewright=%00; other='],
  ['Origin', 'null'],
  ['Content-Encoding', 'gzip'],
  ['Range', 'bytes=-'],
]

type Place = readonly string[]
const placesOf = (value: unknown, place: Place = []): Place[] =>
  typeof value === 'object' && value !== null
    ? [place, ...Object.entries(value).flatMap(([name, one]) => placesOf(one, [...place, name]))]
    : [place]

const membersOf = (value: unknown): Record<string, unknown> =>
  (Array.isArray(value) ? [...value] : { ...(value as object) }) as Record<string, unknown>

/** Answers the body with one place of it taken out, replaced or added to. */
export function mutated(body: unknown, random: Random): unknown {
  return changedAt(body, random.pick(placesOf(body)), random)
}

function changedAt(value: unknown, [step, ...rest]: Place, random: Random): unknown {
  if (step !== undefined) {
    const members = membersOf(value)
    if (rest.length === 0 && random.chance(0.15)) delete members[step]
    else members[step] = changedAt(members[step], rest, random)
    return members
  }
  const isObject = typeof value === 'object' && value !== null && !Array.isArray(value)
  if (!isObject || random.chance(0.3)) return random.pick(VALUES)
  return { ...value, [random.pick([...NAMES, 'id', 'effect'])]: random.pick(VALUES) }
}
