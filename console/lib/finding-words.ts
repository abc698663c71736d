import { stateInWords } from '#shared/checks/finding-words.ts'
import { joinWords } from './format.ts'

/** How names are read out of ids. */
export interface ModelNames {
  readonly token: (id: string) => string
  readonly theme: (id: string) => string
}

/** `light, rest and focus` */
export function whereInWords(theme: string, states: readonly string[]): string {
  return `${theme}, ${joinWords(states.map(stateInWords))}`
}
