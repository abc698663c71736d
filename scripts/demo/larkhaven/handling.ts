import type { Person } from './step.ts'

/** Who speaks in the breach log: everybody of the demo may. */
export type Speaker = Person | 'engineer'

/** An entry of the log, found by what it is about. */
export interface LoggedPair {
  readonly foreground: string
  readonly background: string
  readonly theme: string
  readonly state: string
}

export interface Handling {
  readonly of: LoggedPair
  readonly assignee?: Speaker
  readonly comments: readonly { readonly by: Speaker; readonly body: string }[]
}

/** One check of a pipeline; without a color it checks the head as it stands. */
export interface Run {
  readonly branch: string
  readonly commit: string
  readonly color?: { readonly token: string; readonly oklch: readonly [number, number, number] }
}

export interface Pipeline {
  /** Name of its key. */
  readonly name: string
  readonly repository: string
  readonly runs: readonly Run[]
}

const TIMETABLE = 'larkhaven/timetable'

export const protectedBranches = [{ repository: TIMETABLE, branch: 'main' }] as const

/** Lighter than a field that is pointed at can bear: 3.94 of 4.5. */
const PALE_PLACEHOLDER = { token: 'text.placeholder', oklch: [0.56, 0.02, 240] } as const

/** What two pipelines saw: one breach on the protected branch was fixed there, one stands. */
export const pipelines: readonly Pipeline[] = [
  {
    name: 'Timetable pipeline',
    repository: TIMETABLE,
    runs: [
      { branch: 'winter-notices', commit: '4be1d02', color: PALE_PLACEHOLDER },
      { branch: 'main', commit: '9c27f10', color: PALE_PLACEHOLDER },
      { branch: 'main', commit: 'a80d3e5' },
      {
        branch: 'main',
        commit: 'd41f7b2',
        color: { token: 'sea.8', oklch: [0.47, 0.105, 248] },
      },
    ],
  },
  {
    name: 'Quayside kiosk pipeline',
    repository: 'larkhaven/quayside-kiosk',
    runs: ['1f0e6a9', '77b3c41', 'e5520dd'].map((commit) => ({
      branch: 'glare-trial',
      commit,
      color: { token: 'sign.ground', oklch: [0.24, 0.02, 250] },
    })),
  },
]

const atRest = (foreground: string, background: string, theme = 'light'): LoggedPair => ({
  foreground,
  background,
  theme,
  state: 'rest/rest',
})

export const handling: readonly Handling[] = [
  {
    of: atRest('status.delayed', 'surface.hull'),
    assignee: 'pelle',
    comments: [
      {
        by: 'a11y',
        body: 'The delayed rows are the ones people look for in a hurry. Pelle, can lamp.7 go darker?',
      },
      {
        by: 'pelle',
        body: 'A step darker on the hull looks brown beside the cancelled rows. Trying a warmer hue first.',
      },
    ],
  },
  { of: atRest('status.delayed', 'surface.deck'), assignee: 'pelle', comments: [] },
  {
    of: atRest('action.board.text', 'action.board.fill'),
    assignee: 'maintainer',
    comments: [
      {
        by: 'engineer',
        body: 'The crew tablet shows this button at night as well. Does dark hold?',
      },
      {
        by: 'maintainer',
        body: 'It does, with 4.60 at rest. Only light falls short, since the button got lighter.',
      },
    ],
  },
  {
    of: atRest('chart.route.3', 'chart.paper'),
    comments: [
      {
        by: 'a11y',
        body: 'The routes carry their names on the chart. Still, the line alone should hold.',
      },
    ],
  },
]
