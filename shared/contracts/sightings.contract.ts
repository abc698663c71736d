import * as z from 'zod'
import { contrastKindSchema } from './breach-filter.ts'
import {
  cursorSchema,
  idSchema,
  instantSchema,
  limitSchema,
  momentSchema,
  slugSchema,
  systemParams,
} from './fields.ts'
import { basisSchema, hexSchema, pairStateSchema, ratioSchema, useSchema } from './findings.ts'
import { READ_PROBLEMS } from './problems.ts'
import { defineContract } from './route.ts'

export const SIGHTING_SORTS = ['-first-seen', 'first-seen', '-last-seen'] as const

export const sightingSchema = z
  .strictObject({
    repository: z.string(),
    branch: z.string(),
    protected: z
      .boolean()
      .meta({ description: 'Whether the branch was protected when it was seen last' }),
    foreground: z.string(),
    background: z.string(),
    kind: contrastKindSchema,
    use: useSchema,
    theme: slugSchema,
    state: pairStateSchema,
    basis: basisSchema,
    gating: z.boolean(),
    ratio: ratioSchema.meta({ description: 'As measured last' }),
    required: z.number(),
    rendered: z.strictObject({ foreground: hexSchema, background: hexSchema }),
    firstSeenAt: instantSchema,
    lastSeenAt: instantSchema,
    count: z.int().min(1).meta({ description: 'Checks that saw it' }),
    lastCommit: z.string().optional(),
    lastCheck: idSchema,
    breach: z
      .strictObject({ id: idSchema, number: z.int().min(1) })
      .optional()
      .meta({ description: 'Its entry in the breach log, where a protected branch opened one' }),
    fingerprint: z.string().meta({ description: "The finding's, as a check gives it" }),
  })
  .meta({
    id: 'Sighting',
    description: 'What checks of one branch found short: one a repository, branch and identity',
  })
export type SightingWire = z.infer<typeof sightingSchema>

export const listSightings = defineContract({
  operationId: 'listSightings',
  method: 'GET',
  path: '/v1/systems/{system}/sightings',
  feature: 'breaches',
  summary: 'What pipelines found short, by repository and branch',
  description:
    'Those of a branch that is not protected are kept for 30 days after they were seen last. By -last-seen one that is seen again while pages are read moves to the front.',
  params: systemParams,
  query: z.strictObject({
    repository: z.string().max(255).optional(),
    branch: z.string().max(255).optional(),
    protected: z
      .enum(['true', 'false'])
      .optional()
      .meta({ description: 'Only those of protected branches, or of others' }),
    theme: slugSchema.optional(),
    token: z.string().max(255).optional().meta({ description: 'On either side' }),
    since: momentSchema.optional().meta({ description: 'Seen last then or later' }),
    sort: z.enum(SIGHTING_SORTS).default('-first-seen'),
    limit: limitSchema(200, 50),
    cursor: cursorSchema,
  }),
  success: {
    status: 200,
    body: z.strictObject({
      items: z.array(sightingSchema),
      total: z.int().meta({ description: 'Sightings that the filter finds' }),
    }),
    example: {
      items: [
        {
          repository: 'larkhaven/timetable',
          branch: 'winter-blue',
          protected: false,
          foreground: 'action.board.text',
          background: 'action.board.fill',
          kind: 'text',
          use: 'text',
          theme: 'light',
          state: 'rest/rest',
          basis: 'srgb',
          gating: true,
          ratio: 3.8804,
          required: 4.5,
          rendered: { foreground: '#faf8f2', background: '#2283c1' },
          firstSeenAt: '2026-11-24T09:12:00.000Z',
          lastSeenAt: '2026-11-27T10:02:11.481Z',
          count: 4,
          lastCommit: '4be1d02',
          lastCheck: 'chk_01jd5w7k2m',
          fingerprint: 'tok_01jd/tok_01je/tok_01jf/text/thm_01jd/rest/rest',
        },
      ],
      total: 1,
    },
  },
  problems: READ_PROBLEMS,
  access: 'breaches:read',
  conditional: true,
})
