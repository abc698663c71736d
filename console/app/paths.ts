/** Every address of the console. A segment is encoded here and nowhere else. */
const segment = encodeURIComponent

export const paths = {
  signIn: (next?: string) =>
    next === undefined || next === '/' ? '/sign-in' : `/sign-in?next=${segment(next)}`,
  systems: () => '/systems',
  tokens: (system: string, search = '') => `/systems/${segment(system)}/tokens${search}`,
  token: (system: string, name: string) => `/systems/${segment(system)}/tokens/${segment(name)}`,
  breaches: (system: string, search = '') => `/systems/${segment(system)}/breaches${search}`,
  breach: (system: string, id: string, search = '') =>
    `/systems/${segment(system)}/breaches/${segment(id)}${search}`,
  apiReference: () => '/docs',
} as const
