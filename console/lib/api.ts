import { ApiError, createClient, type Send } from '#shared/client/client.ts'

const sendByFetch: Send = async ({ method, url, headers, body }) => {
  const response = await fetch(url, {
    method,
    headers,
    credentials: 'same-origin',
    ...(body === undefined ? {} : { body }),
  })
  return {
    status: response.status,
    headers: Object.fromEntries(response.headers),
    body: await response.text(),
  }
}

/** The console's one way to the service. */
export const call = createClient({ baseUrl: '', send: sendByFetch })

export function isRefusal(error: unknown, status: number): boolean {
  return error instanceof ApiError && error.status === status
}
