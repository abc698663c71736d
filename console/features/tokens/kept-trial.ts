import * as z from 'zod'

const keptSchema = z.object({
  kept: z.object({ token: z.string(), text: z.string(), message: z.string() }),
})

/** What was typed about a token and could not be saved: it travels with the history entry through signing in. */
export type KeptTrial = z.infer<typeof keptSchema>['kept']

/** What a history entry kept for that token. */
export function keptTrial(state: unknown, token: string): KeptTrial | undefined {
  const read = keptSchema.safeParse(state)
  return read.success && read.data.kept.token === token ? read.data.kept : undefined
}
