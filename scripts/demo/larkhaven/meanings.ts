import type { DemoToken } from './step.ts'

type Detail = Omit<DemoToken, 'name' | 'value' | 'message'>

const ALL_STATES = ['hover', 'active', 'focus', 'disabled'] as const

const token = (
  name: string,
  value: DemoToken['value'],
  description?: string,
  detail: Detail = {},
): DemoToken => ({
  name,
  value,
  ...(description === undefined ? {} : { description }),
  ...detail,
  message: `Meaning: ${name.split('.')[0]}`,
})

const surfaces = [
  token('surface.deck', '{sand.1}', 'Page of all three products'),
  token('surface.hull', '{sand.2}', 'Rows and panels on the deck'),
  token('surface.cabin', '{sand.3}', 'Panels within panels'),
  token('surface.chosen', '{sea.2}', 'The sailing that is chosen', {
    states: ['hover'],
    rules: { states: { hover: { lightness: 0.03 } } },
  }),
  token('surface.inverse', '{sea.10}', 'Footer and banners'),
  token('surface.night', 'oklch(0.15 0.03 255)', 'Bridge and car deck at night', {
    rules: { themes: { dark: { kind: 'keep' } } },
  }),
  token('surface.glass', 'oklch(0.235 0.042 250 / 0.72)', 'Caption over a photograph'),
]

const texts = [
  token('text.primary', '{sea.11}', 'What is read first'),
  token('text.secondary', '{fog.8}', 'Via, platform, distance'),
  token('text.muted', 'oklch(0.49 0.026 240)', 'When it was updated'),
  token('text.placeholder', 'oklch(0.52 0.02 240)', 'Example in an empty field'),
  token('text.inverse', '{sand.1}', 'On inverse and on filled signs'),
  token('text.link', '{sea.7}', 'Links, underlined or not', { states: [...ALL_STATES] }),
  token('text.error', '{buoy.7}', 'What is wrong with a field'),
  token('text.glass', 'oklch(0.975 0.008 86)', 'Caption over a photograph'),
]

const actions = [
  token(
    'action.board.fill',
    'oklch(0.545 0.128 243)',
    'Background of the board button on all three products',
    {
      states: [...ALL_STATES],
      rules: { themes: { kiosk: { kind: 'shift', lightness: -0.15, chroma: 1.05 } } },
    },
  ),
  token('action.board.text', '{sand.1}', 'Label of the board button'),
  token('action.board.edge', '{sea.8}', 'Edge of the board button'),
  token(
    'action.quiet.fill',
    { derive: '{surface.hull}', lightness: -0.02, chroma: 1.2 },
    'Background of a second choice',
    {
      states: [...ALL_STATES],
    },
  ),
  token('action.quiet.text', '{sea.8}', 'Label of a second choice', { states: ['disabled'] }),
  token('action.quiet.edge', '{fog.6}', 'Edge of a second choice'),
  token('action.cancel.fill', '{buoy.6}', 'Background of the cancel button', {
    states: [...ALL_STATES],
  }),
  token('action.cancel.text', '{sand.1}', 'Label of the cancel button'),
]

const fields = [
  token('field.fill', 'oklch(0.993 0.003 95)', 'Inside of a field', {
    states: ['hover', 'disabled'],
  }),
  token('field.edge', '{fog.6}', 'Line round a field', { states: ['hover', 'disabled'] }),
  token('field.text', '{text.primary}', 'What was typed', { states: ['disabled'] }),
  token('border.rule', '{sand.4}', 'Between rows; carries nothing alone'),
  token('border.strong', '{fog.6}', 'Between parts that belong apart'),
  token('border.chosen', '{action.board.fill}', 'Round the sailing that is chosen'),
  token('focus.inner', '{sand.1}', 'Inner band of the focus ring'),
  token('focus.outer', '{sea.9}', 'Outer band of the focus ring'),
]

const statuses = [
  token('status.ontime', '{kelp.6}', 'Runs to time'),
  token('status.delayed', '{lamp.7}', 'Runs late'),
  token('status.cancelled', '{buoy.7}', 'Does not run'),
  token('status.boarding', '{sea.7}', 'Takes passengers now'),
  token('status.wash.ontime', '{kelp.1}', 'Behind a row that runs to time'),
  token('status.wash.delayed', '{lamp.1}', 'Behind a row that runs late'),
  token('status.wash.cancelled', '{buoy.1}', 'Behind a row that does not run'),
  token(
    'status.wash.boarding',
    { derive: '{surface.chosen}', lightness: 0.03, chroma: 0.7 },
    'Behind a row that boards',
  ),
]

const charts = [
  token('chart.route.1', 'oklch(0.51 0.125 252)', 'Mainland to Skerry'),
  token('chart.route.2', 'oklch(0.56 0.15 42)', 'Skerry to Holm'),
  token('chart.route.3', 'oklch(0.58 0.115 165)', 'Holm to Ness'),
  token('chart.route.4', 'oklch(0.5 0.14 305)', 'Ness to the mainland'),
  token('chart.route.5', 'oklch(0.6 0.112 80)', 'Night route'),
  token('chart.route.6', 'oklch(0.55 0.095 205)', 'Freight'),
  token('chart.paper', '{sand.2}', 'Paper of the timetable chart'),
  token('chart.axis', '{fog.8}', 'Hours and distances'),
  token('chart.grid', '{fog.3}', 'Lines behind the routes; carry nothing alone'),
  token('tide.high', 'oklch(0.47 0.1 250)', 'High water'),
  token('tide.low', { derive: '{tide.high}', lightness: 0.14, chroma: 0.9 }, 'Low water'),
  token('tide.mark', 'oklch(0.59 0.17 35)', 'Now, on the tide curve'),
]

const places = [
  token('seat.free', '{kelp.5}', 'A seat to take', { states: ['hover', 'active', 'focus'] }),
  token('seat.taken', { derive: '{fog.6}', chroma: 0.5 }, 'A seat that is gone'),
  token('seat.yours', '{action.board.fill}', 'The seat you hold'),
  token('seat.label', '{sand.1}', 'Number on a seat'),
  token('map.water', 'oklch(0.925 0.03 233)', 'Sea on the route map'),
  token('map.land', 'oklch(0.905 0.03 95)', 'Land on the route map'),
  token('map.shoal', { derive: '{map.water}', lightness: -0.05, chroma: 1.3 }, 'Shallow water'),
  token('map.course', 'oklch(0.5 0.13 262)', 'The course steered, the same by day and night', {
    rules: { themes: { dark: { kind: 'keep' } } },
  }),
]

const signs = [
  token('sign.ground', 'oklch(0.2 0.02 250)', 'The quayside board, the same by day and night'),
  token('sign.text', 'oklch(0.955 0.01 95)', 'Times on the quayside board'),
  token('sign.gate', 'oklch(0.84 0.155 85)', 'Gate on the quayside board'),
  token('sign.rule', 'oklch(0.42 0.02 250)', 'Between lines of the board; carries nothing alone'),
  token('crew.alert.fill', 'oklch(0.53 0.19 27)', 'Alarm on the crew tablet', {
    states: ['focus'],
  }),
  token('crew.alert.text', 'oklch(0.985 0.005 95)', 'Words of an alarm'),
  token('crew.watch.fill', 'oklch(0.3 0.045 250)', 'Watch list on the crew tablet'),
  token('crew.watch.text', 'oklch(0.86 0.03 230)', 'Names on the watch list'),
  token(
    'crew.beacon',
    'oklch(0.65 0.22 30)',
    'Beacon that answers, redder than sRGB where the screen can',
  ),
  token('brand.logotype', 'oklch(0.62 0.13 236)', 'The line Larkhaven Ferries'),
  token('brand.wake', '{sea.5}', 'The wave under the name'),
  token('scrim', 'oklch(0.15 0.03 255 / 0.56)', 'Over the page under a dialog'),
]

/** The tokens that products use, in ledger order; the palette follows them. */
export const meanings: readonly DemoToken[] = [
  ...surfaces,
  ...texts,
  ...actions,
  ...fields,
  ...statuses,
  ...charts,
  ...places,
  ...signs,
]
