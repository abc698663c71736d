import { stateInWords } from '#shared/checks/finding-words.ts'
import { joinWords } from './format.ts'

/** `light, rest and focus` */
export function whereInWords(theme: string, states: readonly string[]): string {
  return `${theme}, ${joinWords(states.map(stateInWords))}`
}
