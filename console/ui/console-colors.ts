/** One colour of the console in both modes: its OKLCH source, and the hex that ships and is measured. */
export interface ConsoleColor {
  readonly name: string
  readonly light: Shade
  readonly dark: Shade
}

export interface Shade {
  readonly l: number
  readonly c: number
  readonly h: number
  readonly hex: `#${string}`
}

/** The console's own palette, in the order and the groups in which its strip shows it. */
export const CONSOLE_COLOR_GROUPS: readonly (readonly ConsoleColor[])[] = [
  [
    color('ground', [0.963, 0.0075, 97, '#f4f3ed'], [0.228, 0.042, 255, '#0e1d30']),
    color('ink', [0.248, 0.045, 258, '#132136'], [0.935, 0.012, 95, '#eceae1']),
    color('ink-soft', [0.445, 0.034, 252, '#465567'], [0.775, 0.022, 235, '#a9b8c2']),
    color('edge', [0.57, 0.034, 246, '#677a8b'], [0.62, 0.042, 246, '#72899e']),
    color('rule', [0.7, 0.032, 242, '#8ea1b1'], [0.48, 0.045, 250, '#4a6076']),
    color('feint', [0.862, 0.02, 236, '#c6d4dd'], [0.352, 0.042, 252, '#2b3d51']),
  ],
  [
    color('madder', [0.48, 0.165, 18, '#a62438'], [0.74, 0.135, 18, '#f4858a']),
    color('weld', [0.49, 0.1, 90, '#765d00'], [0.85, 0.128, 98, '#e4cf65']),
    color('woad', [0.455, 0.11, 250, '#1c5991'], [0.79, 0.095, 240, '#80c3f2']),
    color('woad-wash', [0.918, 0.026, 240, '#d5e7f4'], [0.318, 0.062, 250, '#173451']),
  ],
  [
    color('ground-deep', [0.938, 0.009, 96, '#ecebe4'], [0.268, 0.045, 254, '#16273b']),
    color('ground-sheet', [0.982, 0.005, 97, '#faf9f5'], [0.205, 0.04, 256, '#0a1729']),
  ],
]

export const CONSOLE_COLORS: readonly ConsoleColor[] = CONSOLE_COLOR_GROUPS.flat()

/** The least ratio a colour must keep on every ground that it may stand on. */
export const CONSOLE_REQUIRED = {
  ink: 4.5,
  'ink-soft': 4.5,
  madder: 4.5,
  weld: 4.5,
  woad: 4.5,
  edge: 3,
} as const

export const CONSOLE_GROUNDS = ['ground', 'ground-deep', 'ground-sheet', 'woad-wash'] as const

/** One colour of the palette by its name. */
export function consoleColor(name: string): ConsoleColor {
  const found = CONSOLE_COLORS.find((entry) => entry.name === name)
  if (found === undefined) throw new TypeError(`the console has no colour ${name}`)
  return found
}

type Values = readonly [l: number, c: number, h: number, hex: `#${string}`]

function color(name: string, light: Values, dark: Values): ConsoleColor {
  return { name, light: shade(light), dark: shade(dark) }
}

function shade([l, c, h, hex]: Values): Shade {
  return { l, c, h, hex }
}
