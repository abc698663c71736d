import * as z from 'zod'

const text = z.looseObject({ text: z.string() })

/** A check as a SARIF log: the members that the standard requires; further ones are the standard's own. */
export const sarifLogSchema = z
  .looseObject({
    version: z.literal('2.1.0'),
    runs: z.array(
      z.looseObject({
        tool: z.looseObject({ driver: z.looseObject({ name: z.string() }) }),
        results: z.array(
          z.looseObject({
            ruleId: z.string(),
            kind: z.enum(['fail', 'pass', 'notApplicable', 'informational']),
            level: z.enum(['none', 'note', 'warning', 'error']),
            message: text,
          }),
        ),
      }),
    ),
  })
  .meta({
    id: 'SarifLog',
    description:
      'SARIF 2.1.0, one run. A rule for each WCAG criterion. breach: error, or warning where its theme only reports; known: note; waived: suppressed; exempt: notApplicable; advisories: informational. Tokens are logical locations.',
  })
