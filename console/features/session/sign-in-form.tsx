import { useMutation } from '@tanstack/react-query'
import { type FormEvent, useState } from 'react'
import { SolidButton } from '#console/ui/button.tsx'
import { LineField } from '#console/ui/line-field.tsx'
import { ApiError } from '#shared/client/client.ts'
import type { MeWire } from '#shared/contracts/sessions.contract.ts'
import { startSession } from './session.queries.ts'

export function SignInForm({ onSignedIn }: { onSignedIn: (me: MeWire) => Promise<void> }) {
  const [missing, setMissing] = useState<{ email?: string; password?: string }>({})
  const signing = useMutation({ mutationFn: startSession, onSuccess: onSignedIn })

  function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault()
    const form = new FormData(event.currentTarget)
    const email = String(form.get('email') ?? '').trim()
    const password = String(form.get('password') ?? '')
    setMissing({
      ...(email === '' ? { email: 'Which address were you invited at?' } : {}),
      ...(password === '' ? { password: 'The password is missing.' } : {}),
    })
    if (email !== '' && password !== '') signing.mutate({ email, password })
  }

  return (
    <form onSubmit={submit} noValidate className="mt-28">
      <LineField
        label="E-mail"
        name="email"
        type="email"
        autoComplete="username"
        fault={missing.email}
        className="[&_input]:h-38 [&_input]:text-16"
      />
      <LineField
        label="Password"
        name="password"
        type="password"
        autoComplete="current-password"
        fault={missing.password}
        className="mt-20 [&_input]:h-38 [&_input]:text-16"
      />
      {signing.isError && (
        <p role="alert" className="mt-16 font-semibold text-madder">
          {refusalInWords(signing.error)}
        </p>
      )}
      <SolidButton type="submit" className="mt-28 min-h-40 px-22" aria-busy={signing.isPending}>
        {signing.isPending ? 'Signing in' : 'Sign in'}
      </SolidButton>
    </form>
  )
}

function refusalInWords(error: Error): string {
  if (!(error instanceof ApiError)) return 'The service does not answer. Try once more.'
  if (error.status === 401) return 'E-mail and password do not match.'
  if (error.status === 429) {
    const seconds = error.retryAfterSeconds
    return seconds === undefined
      ? 'Too many tries. Wait a little.'
      : `Too many tries. Wait ${seconds} seconds.`
  }
  return `${error.problem?.title ?? 'The service failed'}.`
}
