import pc from 'picocolors'

/** The few ways a line is marked; each only doubles what the words already say. */
export interface Painter {
  short(text: string): string
  strong(text: string): string
  soft(text: string): string
  /** The foreground's letters on the background, and a space; nothing where it cannot be shown. */
  sample(foreground: string, background: string): string
}

const OPAQUE = /^#([0-9a-f]{2})([0-9a-f]{2})([0-9a-f]{2})$/

const channelsOf = (hex: string): string | undefined =>
  OPAQUE.exec(hex)
    ?.slice(1)
    .map((pair) => Number.parseInt(pair, 16))
    .join(';')

/** A painter; without colour every text stays as it is. Translucent colours get a blank sample. */
export function painterFor(hasColor: boolean): Painter {
  const { bold, red, dim } = pc.createColors(hasColor)
  return {
    short: (text) => bold(red(text)),
    strong: bold,
    soft: dim,
    sample: (foreground, background) => {
      if (!hasColor) return ''
      const [over, under] = [channelsOf(foreground), channelsOf(background)]
      if (over === undefined || under === undefined) return '     '
      return `\u001b[38;2;${over};48;2;${under}m Aa \u001b[0m `
    },
  }
}

/** Whether colour may be used. @see https://no-color.org an informal standard */
export function hasColor(
  env: Readonly<Record<string, string | undefined>>,
  isTerminal: boolean,
): boolean {
  if (env.NO_COLOR) return false
  if (env.FORCE_COLOR) return env.FORCE_COLOR !== '0'
  return isTerminal && env.TERM !== 'dumb'
}
