/** Every address of the console. A segment is encoded here and nowhere else. */
const segment = encodeURIComponent

export const paths = {
  signIn: (next?: string) =>
    next === undefined || next === '/' ? '/sign-in' : `/sign-in?next=${segment(next)}`,
  systems: () => '/systems',
  tokens: (system: string, search = '') => `/systems/${segment(system)}/tokens${search}`,
  token: (system: string, name: string) => `/systems/${segment(system)}/tokens/${segment(name)}`,
  importFile: (system: string) => `/systems/${segment(system)}/import`,
  pairs: (system: string, search = '') => `/systems/${segment(system)}/pairs${search}`,
  pair: (system: string, id: string) => `/systems/${segment(system)}/pairs/${segment(id)}`,
  newPair: (system: string, search = '') => `/systems/${segment(system)}/new-pair${search}`,
  pairSheet: (system: string, search = '') => `/systems/${segment(system)}/pair-sheet${search}`,
  coverage: (system: string) => `/systems/${segment(system)}/coverage`,
  /** With the set that is opened in it, or `new`. */
  distinctSets: (system: string, set?: string) =>
    `/systems/${segment(system)}/distinct-sets${set === undefined ? '' : `?set=${segment(set)}`}`,
  breaches: (system: string, search = '') => `/systems/${segment(system)}/breaches${search}`,
  breach: (system: string, id: string, search = '') =>
    `/systems/${segment(system)}/breaches/${segment(id)}${search}`,
  sightings: (system: string) => `/systems/${segment(system)}/sightings`,
  settings: (system: string) => `/systems/${segment(system)}/settings`,
  themes: (system: string) => `/systems/${segment(system)}/themes`,
  theme: (system: string, key: string) => `/systems/${segment(system)}/themes/${segment(key)}`,
  newTheme: (system: string, from: string) =>
    `/systems/${segment(system)}/new-theme?from=${segment(from)}`,
  rules: (system: string, search = '') => `/systems/${segment(system)}/rules${search}`,
  members: (system: string) => `/systems/${segment(system)}/members`,
  keys: (system: string) => `/systems/${segment(system)}/keys`,
  apiReference: () => '/docs',
} as const
