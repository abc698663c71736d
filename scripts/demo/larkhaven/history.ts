import type { PairName, Step } from './step.ts'

const logotypeOn = (background: string): PairName => ({
  foreground: 'brand.logotype',
  background,
  use: 'text',
  product: 'timetable',
})
const exempt = { kind: 'logotype', reason: 'The line of the brand name' } as const

/** What happened since: breaches opened, eased, worsened and closed, and nine left open. */
export const history: readonly Step[] = [
  {
    by: 'a11y',
    kind: 'patch-pair',
    pair: logotypeOn('surface.deck'),
    body: { exempt, message: 'A logotype on the deck' },
  },
  {
    by: 'a11y',
    kind: 'patch-pair',
    pair: logotypeOn('surface.hull'),
    body: { exempt, message: 'A logotype on the hull' },
  },
  {
    by: 'pelle',
    kind: 'patch-token',
    name: 'lamp.7',
    body: { value: 'oklch(0.555 0.114 64)', message: 'Amber as the lamps on the quay burn' },
  },
  {
    by: 'sanna',
    kind: 'patch-token',
    name: 'fog.8',
    body: { value: 'oklch(0.525 0.026 242)', message: 'Softer secondary text' },
  },
  {
    by: 'sanna',
    kind: 'patch-token',
    name: 'sign.gate',
    body: { value: 'oklch(0.86 0.15 88)', message: 'Gate a little brighter in rain' },
  },
  {
    by: 'sanna',
    kind: 'patch-token',
    name: 'fog.8',
    body: { value: 'oklch(0.452 0.026 242)', message: 'Secondary text back where it can be read' },
  },
  {
    by: 'pelle',
    kind: 'patch-token',
    name: 'buoy.6',
    body: { value: 'oklch(0.6 0.188 27)', message: 'Cancel in the red of the new buoys' },
  },
  {
    by: 'pelle',
    kind: 'patch-token',
    name: 'lamp.7',
    body: { value: 'oklch(0.575 0.116 64)', message: 'Amber for the autumn notices' },
  },
  {
    by: 'maintainer',
    kind: 'patch-token',
    name: 'buoy.6',
    body: { value: 'oklch(0.552 0.188 27)', message: 'Cancel dark enough for its label' },
  },
  {
    by: 'sanna',
    kind: 'patch-token',
    name: 'crew.beacon',
    body: { value: 'oklch(0.59 0.25 30)', message: 'Beacon as red as the screen can' },
  },
  {
    by: 'maintainer',
    kind: 'patch-token',
    name: 'text.muted',
    body: { value: 'oklch(0.528 0.026 240)', message: 'Quieter time of update' },
  },
  {
    by: 'maintainer',
    kind: 'patch-token',
    name: 'action.board.fill',
    body: { value: 'oklch(0.585 0.128 243)', message: 'Lighter board button' },
  },
  {
    by: 'pelle',
    kind: 'patch-token',
    name: 'chart.route.3',
    body: { value: 'oklch(0.63 0.115 165)', message: 'Holm to Ness in sea green' },
  },
  {
    by: 'maintainer',
    kind: 'patch-token',
    name: 'focus.outer',
    body: {
      description: 'Outer band of the focus ring, on every product',
      message: 'Said whose ring',
    },
  },
]
