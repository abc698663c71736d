import { QueryClient } from '@tanstack/react-query'
import { ApiError } from '#shared/client/client.ts'

/** What the service refused it will refuse again; only what it could not answer is asked for once more. */
function isWorthAnotherTry(failures: number, error: Error): boolean {
  const couldNotAnswer = !(error instanceof ApiError) || error.status >= 500
  return couldNotAnswer && failures < 2
}

export const queryClient = new QueryClient({
  defaultOptions: {
    queries: { staleTime: 10_000, retry: isWorthAnotherTry },
    mutations: { retry: false },
  },
})
