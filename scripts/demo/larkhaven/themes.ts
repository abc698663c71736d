import type { DemoRules, DemoTheme } from './step.ts'

/** The base first. */
export const themes: readonly DemoTheme[] = [
  {
    key: 'light',
    name: 'Light',
    ground: 'surface.deck',
    ink: 'text.primary',
    message: 'Light, the base',
  },
  {
    key: 'dark',
    name: 'Dark',
    ground: 'surface.deck',
    ink: 'text.primary',
    rule: { kind: 'mirror', chroma: 0.92 },
    values: {
      'surface.deck': { rest: 'oklch(0.19 0.03 255)' },
      'surface.hull': { rest: 'oklch(0.232 0.034 252)' },
      'surface.cabin': { rest: 'oklch(0.275 0.04 250)' },
      'text.primary': { rest: 'oklch(0.96 0.015 220)' },
      'status.delayed': { rest: 'oklch(0.76 0.13 74)' },
      'chart.paper': { rest: 'oklch(0.33 0.038 250)' },
      'focus.outer': { rest: '{sea.11}' },
    },
    message: 'Dark, for the car deck and the evening boats',
  },
  {
    key: 'kiosk',
    name: 'Quayside kiosk',
    ground: 'surface.deck',
    ink: 'text.primary',
    rule: { kind: 'shift', lightness: -0.09, chroma: 1.05 },
    level: 'AAA',
    values: {
      'surface.deck': { rest: 'oklch(1 0 none)' },
      'text.primary': { rest: 'oklch(0.16 0.03 255)' },
      'status.delayed': { rest: '{lamp.8}' },
      'status.boarding': { rest: '{sea.8}' },
      'text.link': { rest: '{sea.8}' },
      'field.fill': { rest: 'oklch(1 0 none)' },
    },
    message: 'Kiosk, read in glare',
  },
]

/** State rules of the system, and the rules of name prefixes. */
export const rules: DemoRules = {
  states: {
    hover: { lightness: 0.05 },
    active: { lightness: 0.1 },
    disabled: { chroma: 0.35, alpha: 0.45 },
  },
  prefixes: [
    { prefix: 'chart', themes: { dark: { kind: 'match-contrast', against: '{chart.paper}' } } },
    { prefix: 'tide', themes: { dark: { kind: 'match-contrast', against: '{chart.paper}' } } },
    { prefix: 'map', themes: { dark: { kind: 'relative', k: 1 } } },
    { prefix: 'sand', themes: { kiosk: { kind: 'keep' } } },
    { prefix: 'sign', themes: { dark: { kind: 'keep' }, kiosk: { kind: 'keep' } } },
    {
      prefix: 'action.board',
      states: {
        hover: { away: '{action.board.text}' },
        active: { away: '{action.board.text}' },
      },
    },
  ],
  message: 'States, and what each family does in the dark and on the kiosk',
}
