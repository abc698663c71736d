import * as z from 'zod'
import { slugSchema, stateSchema } from './fields.ts'
import {
  advisorySchema,
  countsSchema,
  effectExample,
  effectSchema,
  engineSchema,
  findingExample,
  findingSchema,
  hexSchema,
  verdictSchema,
} from './findings.ts'

export const IMPORT_MODES = ['merge', 'replace'] as const
export const importModeSchema = z.enum(IMPORT_MODES).meta({
  id: 'ImportMode',
  description:
    'merge: what the file does not name stays. replace: the file is the whole set of tokens, and of whatever else it lists.',
})

/** Items listed at most, of changes and of findings alike; the counts cover all. */
export const MOST_LISTED = 5000

const tallySchema = z
  .strictObject({
    added: z.int().min(0),
    edited: z.int().min(0),
    removed: z.int().min(0),
    unchanged: z.int().min(0),
  })
  .meta({ id: 'ImportTally' })

/** The members of an item that differ, as its own address gives them. */
const membersSchema = z.record(z.string(), z.unknown())

/** By theme and state, as `hexes` of the ledger view has its two themes. */
const shownColorsSchema = z.record(slugSchema, z.record(slugSchema, hexSchema))
const groundsSchema = z.record(slugSchema, hexSchema)

export const importChangeSchema = z
  .strictObject({
    item: z.enum(['token', 'pair', 'theme', 'distinct-set', 'rules', 'settings', 'other']),
    operation: z.enum(['added', 'edited', 'removed']),
    name: z.string().meta({ description: 'As it is called afterwards' }),
    before: membersSchema.optional().meta({ description: 'Absent of what is added' }),
    after: membersSchema.optional().meta({ description: 'Absent of what is removed' }),
    colors: z
      .strictObject({
        before: shownColorsSchema.optional(),
        after: shownColorsSchema.optional(),
      })
      .optional()
      .meta({
        description:
          'Of a token: what it comes to in each state, in the base theme and in the first of opposite polarity',
      }),
  })
  .meta({
    id: 'ImportChange',
    description: 'One item that the import adds, edits or removes: the members that differ',
  })
export type ImportChangeWire = z.infer<typeof importChangeSchema>

export const importNoteSchema = z
  .strictObject({
    kind: z.enum(['converted', 'overridden', 'left-out']),
    pointer: z.string().meta({ description: 'RFC 6901 pointer into the file' }),
    line: z
      .int()
      .min(1)
      .optional()
      .meta({ description: 'Of a style sheet, which has no pointers' }),
    detail: z.string(),
    token: z.string().optional(),
    theme: z.string().optional(),
    state: stateSchema.optional(),
  })
  .meta({
    id: 'ImportNote',
    description:
      'converted: an older spelling that was read as another value. overridden: a derived colour that was changed in the file and is now set by hand. left-out: what is no colour and cannot be kept.',
  })
export type ImportNoteWire = z.infer<typeof importNoteSchema>

export const importSchema = z
  .strictObject({
    dryRun: z.boolean(),
    mode: importModeSchema,
    written: z
      .boolean()
      .meta({ description: 'Whether a revision was made: not where nothing changes' }),
    counts: z.strictObject({
      tokens: tallySchema,
      pairs: tallySchema,
      themes: tallySchema,
      distinctSets: tallySchema,
      derivedAgain: z
        .int()
        .min(0)
        .meta({ description: 'Derived colours that the file left as they were' }),
    }),
    grounds: z
      .strictObject({ before: groundsSchema, after: groundsSchema })
      .meta({ description: 'The grounds of the themes that colours are shown in' }),
    changes: z.array(importChangeSchema).max(MOST_LISTED),
    notes: z.array(importNoteSchema).max(MOST_LISTED),
    weakens: z
      .array(z.strictObject({ code: z.string(), detail: z.string() }))
      .max(MOST_LISTED)
      .meta({
        description:
          'What asks for less afterwards: a maintainer is refused for it. A dry run is not, it tells.',
      }),
    effect: effectSchema.meta({
      description:
        'The revision that it made or, on a dry run, was merged over, and how the verdict moves',
    }),
    check: z.strictObject({
      verdict: verdictSchema,
      counts: countsSchema,
      findings: z
        .array(findingSchema)
        .max(MOST_LISTED)
        .meta({ description: 'All that are not pass' }),
      advisories: z.array(advisorySchema).max(MOST_LISTED),
      engine: engineSchema,
    }),
    more: z
      .strictObject({
        changes: z.int().min(1).optional(),
        notes: z.int().min(1).optional(),
        weakens: z.int().min(1).optional(),
        findings: z.int().min(1).optional(),
        advisories: z.int().min(1).optional(),
      })
      .optional()
      .meta({ description: `Entries besides the ${MOST_LISTED} that a list has at most` }),
  })
  .meta({ id: 'Import', description: 'What an import changes, or would change, and its check' })
export type ImportWire = z.infer<typeof importSchema>

const none = { added: 0, edited: 0, removed: 0, unchanged: 0 }
export const importExample = {
  dryRun: true,
  mode: 'merge',
  written: false,
  counts: {
    tokens: { ...none, edited: 1, unchanged: 116 },
    pairs: { ...none, unchanged: 160 },
    themes: { ...none, unchanged: 3 },
    distinctSets: none,
    derivedAgain: 0,
  },
  grounds: {
    before: { light: '#f7f9fb', dark: '#0b1722' },
    after: { light: '#f7f9fb', dark: '#0b1722' },
  },
  changes: [
    {
      item: 'token',
      operation: 'edited',
      name: 'action.board.fill',
      before: { value: { colorSpace: 'oklch', components: [0.551, 0.128, 243], alpha: 1 } },
      after: { value: { colorSpace: 'oklch', components: [0.6, 0.128, 243], alpha: 1 } },
      colors: {
        before: { light: { rest: '#1273b1' }, dark: { rest: '#3d95d4' } },
        after: { light: { rest: '#2283c1' }, dark: { rest: '#3d95d4' } },
      },
    },
  ],
  notes: [],
  weakens: [],
  effect: { ...effectExample, verdict: 'fail', opened: [findingExample] },
  check: {
    verdict: 'fail',
    counts: { pass: 1480, breach: 1, waived: 0, exempt: 96, known: 0 },
    findings: [findingExample],
    advisories: [],
    engine: {
      version: '1.0.0',
      gamutMap: 'css-color-4-binary-search-local-minde',
      ruleSet: 'wcag-2.2',
    },
  },
} as const
