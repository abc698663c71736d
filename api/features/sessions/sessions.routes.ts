import type { CookieOptions } from 'express'
import { type ApiRouter, mount } from '#api/http/route.ts'
import { refusePlainHttp } from '#api/http/origin.ts'
import { getMe, signIn, signOut } from '#shared/contracts/sessions.contract.ts'
import type { SessionsService } from './sessions.service.ts'

const TWELVE_HOURS_MS = 12 * 60 * 60 * 1000

export function mountSessions(router: ApiRouter, sessions: SessionsService): void {
  const { cookie, publicUrl } = router.context
  const options: CookieOptions = {
    httpOnly: true,
    sameSite: 'strict',
    secure: cookie.secure,
    path: '/',
  }

  mount(router, signIn, async ({ body, request, response }) => {
    refusePlainHttp(request, publicUrl)
    const { token, me } = await sessions.signIn({ ...body, address: request.ip ?? 'unknown' })
    response.cookie(cookie.name, token, { ...options, maxAge: TWELVE_HOURS_MS })
    return { body: me }
  })

  mount(router, signOut, async ({ caller, response }) => {
    await sessions.signOut(caller)
    response.clearCookie(cookie.name, options)
    return undefined
  })

  mount(router, getMe, async ({ caller }) => ({ body: await sessions.me(caller) }))
}
