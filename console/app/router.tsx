import {
  createBrowserRouter,
  type LoaderFunctionArgs,
  type RouteObject,
  redirect,
} from 'react-router-dom'
import { Waiting } from '#console/ui/page-states.tsx'
import { ErrorScreen, PageTrouble } from './error-screen.tsx'
import { paths } from './paths.ts'

/** Pages of a system's settings, under navigation of their own. */
const settingsPages: RouteObject[] = [
  { path: 'settings', lazy: () => import('#console/routes/settings-page.tsx') },
  { path: 'themes', lazy: () => import('#console/routes/themes-page.tsx') },
  { path: 'themes/:theme', lazy: () => import('#console/routes/theme-page.tsx') },
  { path: 'new-theme', lazy: () => import('#console/routes/new-theme-page.tsx') },
  { path: 'rules', lazy: () => import('#console/routes/rules-page.tsx') },
  { path: 'members', lazy: () => import('#console/routes/members-page.tsx') },
  { path: 'keys', lazy: () => import('#console/routes/keys-page.tsx') },
]

/** Pages of one system; what fails in one leaves the frame standing. */
const systemPages: RouteObject[] = [
  {
    index: true,
    element: null,
    loader: ({ params }: LoaderFunctionArgs) => redirect(paths.tokens(params.system ?? '')),
  },
  {
    path: 'tokens',
    lazy: () => import('#console/routes/tokens-page.tsx'),
    ErrorBoundary: PageTrouble,
  },
  {
    path: 'tokens/:name',
    lazy: () => import('#console/routes/token-page.tsx'),
    ErrorBoundary: PageTrouble,
  },
  {
    path: 'import',
    lazy: () => import('#console/routes/import-page.tsx'),
    ErrorBoundary: PageTrouble,
  },
  {
    path: 'pairs',
    lazy: () => import('#console/routes/pairs-page.tsx'),
    ErrorBoundary: PageTrouble,
  },
  {
    path: 'pairs/:id',
    lazy: () => import('#console/routes/pair-page.tsx'),
    ErrorBoundary: PageTrouble,
  },
  {
    path: 'new-pair',
    lazy: () => import('#console/routes/new-pair-page.tsx'),
    ErrorBoundary: PageTrouble,
  },
  {
    path: 'pair-sheet',
    lazy: () => import('#console/routes/pair-sheet-page.tsx'),
    ErrorBoundary: PageTrouble,
  },
  {
    path: 'coverage',
    lazy: () => import('#console/routes/coverage-page.tsx'),
    ErrorBoundary: PageTrouble,
  },
  {
    path: 'distinct-sets',
    lazy: () => import('#console/routes/distinct-sets-page.tsx'),
    ErrorBoundary: PageTrouble,
  },
  {
    path: 'breaches/:id?',
    lazy: () => import('#console/routes/breaches-page.tsx'),
    ErrorBoundary: PageTrouble,
  },
  {
    path: 'sightings',
    lazy: () => import('#console/routes/sightings-page.tsx'),
    ErrorBoundary: PageTrouble,
  },
  {
    lazy: () => import('#console/routes/settings-frame.tsx'),
    children: settingsPages.map((page) => ({ ...page, ErrorBoundary: PageTrouble })),
  },
]

const signedInPages: RouteObject[] = [
  { path: 'systems', lazy: () => import('#console/routes/systems-page.tsx') },
  {
    path: 'systems/:system',
    lazy: () => import('#console/routes/system-frame.tsx'),
    children: systemPages,
  },
]

export const router = createBrowserRouter([
  {
    ErrorBoundary: ErrorScreen,
    HydrateFallback: FirstWait,
    children: [
      { index: true, element: null, loader: () => redirect(paths.systems()) },
      { path: 'sign-in', lazy: () => import('#console/routes/sign-in-page.tsx') },
      { lazy: () => import('#console/routes/signed-in.tsx'), children: signedInPages },
      { path: '*', lazy: () => import('#console/routes/not-found-page.tsx') },
    ],
  },
])

function FirstWait() {
  return (
    <main className="px-42 pt-44 wide:px-116">
      <Waiting>Opening the ledger</Waiting>
    </main>
  )
}
