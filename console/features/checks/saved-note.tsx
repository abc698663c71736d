import { joinWords, startSentence } from '#console/lib/format.ts'
import { OutcomeMark } from '#console/ui/outcome-mark.tsx'
import { countOf, stateInWords } from '#shared/checks/finding-words.ts'
import type * as z from 'zod'
import type { effectSchema } from '#shared/contracts/findings.ts'

/** What a save did, in one sentence, and its breaches by name. */
export function SavedNote({ saved }: { saved: { readonly effect: z.infer<typeof effectSchema> } }) {
  const { revision, opened, resolved } = saved.effect
  const parts = [
    opened.length > 0 ? `${countOf(opened.length, 'breach', 'breaches')} opened` : undefined,
    resolved.length > 0 ? `${countOf(resolved.length, 'breach', 'breaches')} resolved` : undefined,
  ].filter((part) => part !== undefined)
  return (
    <div role="status" className="mt-12">
      <p>
        <span className="font-semibold">Saved as revision {revision}.</span>{' '}
        {parts.length === 0 ? 'No verdict moved' : startSentence(joinWords(parts))}.
      </p>
      {opened.length > 0 && (
        <ul className="mt-4 flex flex-wrap gap-x-22">
          {opened.slice(0, 4).map((finding) => (
            <li key={finding.fingerprint}>
              <OutcomeMark kind="breach">
                {finding.foreground} on {finding.background}, {finding.theme},{' '}
                {stateInWords(finding.state)}
              </OutcomeMark>
            </li>
          ))}
          {opened.length > 4 && <li>and {opened.length - 4} more in the breach log</li>}
        </ul>
      )}
    </div>
  )
}
