import type { Use } from '#shared/checks/model.ts'
import type { DemoPair } from './step.ts'

type Detail = Omit<DemoPair, 'foreground' | 'background' | 'use'>

const TIMETABLE = { product: 'timetable', themes: ['light', 'dark'] }
const KIOSK = { product: 'quayside-kiosk', themes: ['kiosk'] }
const CREW = { product: 'crew-tablet', themes: ['light', 'dark'] }

/** Every foreground on every background. */
const each = (
  use: Use,
  foregrounds: readonly string[],
  backgrounds: readonly string[],
  detail: Detail,
): DemoPair[] =>
  foregrounds.flatMap((foreground) =>
    backgrounds.map((background) => ({ foreground, background, use, ...detail })),
  )

/** A ring of two bands: on each background one of them is enough. */
const ring = (backgrounds: readonly string[], detail: Detail): DemoPair[] =>
  backgrounds.flatMap((background) =>
    each('focus-adjacent', ['focus.outer', 'focus.inner'], [background], {
      ...detail,
      states: ['focus'],
      anyOf: `${detail.product} ring on ${background}`,
    }),
  )

const timetable: readonly DemoPair[] = [
  ...each(
    'text',
    ['text.primary', 'text.secondary', 'text.muted'],
    ['surface.deck', 'surface.hull', 'surface.cabin'],
    TIMETABLE,
  ),
  ...each('text', ['text.link', 'text.error'], ['surface.deck', 'surface.hull'], TIMETABLE),
  ...each('text', ['text.primary', 'text.secondary'], ['surface.chosen'], TIMETABLE),
  ...each(
    'text',
    ['status.ontime', 'status.delayed', 'status.cancelled', 'status.boarding'],
    ['surface.deck', 'surface.hull'],
    TIMETABLE,
  ),
  ...['ontime', 'delayed', 'cancelled', 'boarding'].flatMap((status) =>
    each(
      'text',
      [`status.${status}`, 'text.primary', 'text.secondary'],
      [`status.wash.${status}`],
      TIMETABLE,
    ),
  ),
  ...each('text', ['text.inverse'], ['surface.inverse'], TIMETABLE),
  ...each('link-in-text', ['text.link'], ['text.primary'], {
    product: 'timetable',
    themes: ['light'],
  }),
  ...each('text', ['action.board.text'], ['action.board.fill'], {
    ...TIMETABLE,
    relation: 'together',
  }),
  ...each('text', ['action.cancel.text'], ['action.cancel.fill'], {
    ...TIMETABLE,
    relation: 'together',
  }),
  ...each('text', ['action.quiet.text'], ['action.quiet.fill'], {
    ...TIMETABLE,
    relation: 'together',
  }),
  ...each(
    'non-text',
    ['action.board.fill'],
    ['surface.deck', 'surface.hull', 'surface.cabin', 'surface.chosen'],
    TIMETABLE,
  ),
  ...each('non-text', ['action.cancel.fill'], ['surface.deck', 'surface.hull'], TIMETABLE),
  ...each('non-text', ['action.quiet.edge'], ['surface.deck', 'surface.hull'], TIMETABLE),
  ...each('non-text', ['border.chosen'], ['surface.chosen', 'surface.deck'], TIMETABLE),
  ...each('text', ['field.text', 'text.placeholder'], ['field.fill'], {
    ...TIMETABLE,
    relation: 'together',
  }),
  ...each('non-text', ['field.edge'], ['field.fill'], { ...TIMETABLE, relation: 'together' }),
  ...each('non-text', ['field.edge'], ['surface.deck', 'surface.hull'], TIMETABLE),
  ...ring(['surface.deck', 'surface.hull', 'surface.chosen', 'action.board.fill'], TIMETABLE),
  ...each('focus-change', ['focus.outer'], ['surface.deck', 'surface.hull'], TIMETABLE),
  ...each('text', ['text.glass'], ['surface.glass'], { ...TIMETABLE, backdrop: 'unknown' }),
  ...each('text', ['text.inverse'], ['scrim'], {
    ...TIMETABLE,
    themes: ['light'],
    backdrop: ['map.water'],
  }),
]

const charts: readonly DemoPair[] = [
  ...each(
    'non-text',
    [
      'chart.route.1',
      'chart.route.2',
      'chart.route.3',
      'chart.route.4',
      'chart.route.5',
      'chart.route.6',
    ],
    ['chart.paper', 'surface.deck'],
    TIMETABLE,
  ),
  ...each('text', ['chart.axis'], ['chart.paper'], TIMETABLE),
  ...each('non-text', ['tide.high', 'tide.low', 'tide.mark'], ['chart.paper'], TIMETABLE),
  ...each('non-text', ['map.course'], ['map.water', 'map.land'], TIMETABLE),
  ...each('text', ['text.primary'], ['map.water', 'map.land', 'map.shoal'], TIMETABLE),
  ...each('non-text', ['seat.free', 'seat.taken', 'seat.yours'], ['surface.hull'], TIMETABLE),
  ...each('large-text', ['seat.label'], ['seat.free', 'seat.taken', 'seat.yours'], {
    ...TIMETABLE,
    relation: 'together',
  }),
  ...each('text', ['brand.logotype'], ['surface.deck', 'surface.hull'], TIMETABLE),
  ...each('non-text', ['border.strong'], ['surface.deck', 'surface.hull'], TIMETABLE),
]

const kiosk: readonly DemoPair[] = [
  ...each(
    'text',
    ['text.primary', 'text.secondary', 'text.link', 'text.error'],
    ['surface.deck', 'surface.hull'],
    KIOSK,
  ),
  ...each(
    'text',
    ['status.ontime', 'status.delayed', 'status.cancelled', 'status.boarding'],
    ['surface.deck', 'surface.hull'],
    KIOSK,
  ),
  ...each('text', ['action.board.text'], ['action.board.fill'], { ...KIOSK, relation: 'together' }),
  ...each('text', ['action.cancel.text'], ['action.cancel.fill'], {
    ...KIOSK,
    relation: 'together',
  }),
  ...each('text', ['sign.text'], ['sign.ground'], { ...KIOSK, minimum: 15 }),
  ...each('large-text', ['sign.gate'], ['sign.ground'], KIOSK),
  ...each(
    'non-text',
    ['action.board.fill', 'action.cancel.fill'],
    ['surface.deck', 'surface.hull'],
    KIOSK,
  ),
  ...each('non-text', ['seat.free', 'seat.taken', 'seat.yours'], ['surface.hull'], KIOSK),
  ...each('text', ['text.inverse'], ['surface.inverse'], KIOSK),
  ...each('large-text', ['text.glass'], ['surface.glass'], { ...KIOSK, backdrop: 'unknown' }),
  ...ring(['surface.deck', 'surface.hull', 'action.board.fill'], KIOSK),
]

const crew: readonly DemoPair[] = [
  ...each(
    'text',
    ['text.primary', 'text.secondary', 'text.link', 'text.error'],
    ['surface.deck', 'surface.hull'],
    CREW,
  ),
  ...each('text', ['sign.text', 'sign.gate'], ['surface.night'], CREW),
  ...each('text', ['crew.alert.text'], ['crew.alert.fill'], { ...CREW, relation: 'together' }),
  ...each('non-text', ['crew.alert.fill'], ['surface.deck', 'surface.hull', 'surface.cabin'], CREW),
  ...each('text', ['crew.watch.text'], ['crew.watch.fill'], CREW),
  ...each('non-text', ['crew.beacon'], ['crew.watch.fill', 'surface.night'], CREW),
  ...each('text', ['status.cancelled', 'status.ontime'], ['surface.deck'], CREW),
  ...each('text', ['action.board.text'], ['action.board.fill'], { ...CREW, relation: 'together' }),
  ...ring(['surface.deck', 'surface.hull'], CREW),
]

/** What stands on what, in each product. */
export const pairs: readonly DemoPair[] = [...timetable, ...charts, ...kiosk, ...crew]
