/** A number as it was written: none where nothing is written, a fault where it cannot be used. */
export interface NumberReading {
  readonly value?: number
  readonly fault?: string
}

const NUMBER = /^[-+−]?(\d+(\.\d*)?|\.\d+)$/

/** Reads a decimal number within a range; an empty field says nothing. */
export function readNumber(text: string, least: number, most: number): NumberReading {
  const written = text.trim()
  if (written === '') return {}
  const value = NUMBER.test(written) ? Number(written.replace('−', '-')) : Number.NaN
  return value >= least && value <= most
    ? { value }
    : { fault: `Write a number from ${least} to ${most}.` }
}

/** A number as a field shows it. */
export function numberText(value: number | undefined): string {
  return value === undefined ? '' : String(value)
}
