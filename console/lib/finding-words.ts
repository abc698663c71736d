import { joinWords } from './format.ts'

/** `rest/rest` is `rest`; where the sides differ, `hover on rest`. */
export function stateInWords(state: string): string {
  const [foreground = '', background = ''] = state.split('/')
  return foreground === background || background === ''
    ? foreground
    : `${foreground} on ${background}`
}

/** `light, rest and focus` */
export function whereInWords(theme: string, states: readonly string[]): string {
  return `${theme}, ${joinWords(states.map(stateInWords))}`
}
