import {
  createBrowserRouter,
  type LoaderFunctionArgs,
  type RouteObject,
  redirect,
} from 'react-router-dom'
import { Waiting } from '#console/ui/page-states.tsx'
import { ErrorScreen } from './error-screen.tsx'
import { paths } from './paths.ts'

const systemPages: RouteObject[] = [
  {
    index: true,
    loader: ({ params }: LoaderFunctionArgs) => redirect(paths.tokens(params.system ?? '')),
  },
  { path: 'tokens', lazy: () => import('#console/routes/tokens-page.tsx') },
  { path: 'tokens/:name', lazy: () => import('#console/routes/token-page.tsx') },
  { path: 'breaches/:id?', lazy: () => import('#console/routes/breaches-page.tsx') },
]

export const router = createBrowserRouter([
  {
    ErrorBoundary: ErrorScreen,
    HydrateFallback: FirstWait,
    children: [
      { index: true, loader: () => redirect(paths.systems()) },
      { path: 'sign-in', lazy: () => import('#console/routes/sign-in-page.tsx') },
      {
        lazy: () => import('#console/routes/signed-in.tsx'),
        children: [
          { path: 'systems', lazy: () => import('#console/routes/systems-page.tsx') },
          {
            path: 'systems/:system',
            lazy: () => import('#console/routes/system-frame.tsx'),
            children: systemPages,
          },
        ],
      },
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
