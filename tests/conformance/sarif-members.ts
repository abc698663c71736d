import { Ajv2020 } from 'ajv/dist/2020.js'

type Schema = Readonly<Record<string, unknown>>

/** An object of the standard, of which only the members that a check may use are known; no others may stand in it. */
const object = (
  properties: Readonly<Record<string, Schema>>,
  required: readonly string[] = [],
) => ({
  type: 'object',
  properties: { ...properties, properties: { type: 'object' } },
  required,
  additionalProperties: false,
})
const list = (items: Schema): Schema => ({ type: 'array', items })
const string: Schema = { type: 'string' }
const index: Schema = { type: 'integer', minimum: -1 }
const line: Schema = { type: 'integer', minimum: 1 }
const level: Schema = { enum: ['none', 'note', 'warning', 'error'] }

const multiformat = object({ text: string, markdown: string }, ['text'])
const message = {
  ...object({ text: string, markdown: string, id: string, arguments: list(string) }),
  anyOf: [{ required: ['text'] }, { required: ['id'] }],
}
const location = object({
  id: { type: 'integer', minimum: -1 },
  physicalLocation: object({
    artifactLocation: object({ uri: string }),
    region: object({ startLine: line, startColumn: line, endLine: line, endColumn: line }),
  }),
  logicalLocations: list(object({ name: string, fullyQualifiedName: string, kind: string })),
  message,
})
const rule = object(
  {
    id: string,
    name: string,
    shortDescription: multiformat,
    fullDescription: multiformat,
    help: multiformat,
    helpUri: string,
    defaultConfiguration: object({ level }),
  },
  ['id'],
)
const result = object(
  {
    ruleId: string,
    ruleIndex: index,
    kind: { enum: ['notApplicable', 'pass', 'fail', 'review', 'open', 'informational'] },
    level,
    message,
    locations: list(location),
    relatedLocations: list(location),
    partialFingerprints: { type: 'object', additionalProperties: string },
    suppressions: list(
      object(
        {
          kind: { enum: ['inSource', 'external'] },
          status: { enum: ['accepted', 'underReview', 'rejected'] },
          justification: string,
        },
        ['kind'],
      ),
    ),
  },
  ['message'],
)
const driver = object(
  {
    name: string,
    version: string,
    informationUri: string,
    fullDescription: multiformat,
    rules: list(rule),
  },
  ['name'],
)
const run = object(
  {
    tool: object({ driver }, ['driver']),
    automationDetails: object({ id: string }),
    results: list(result),
  },
  ['tool'],
)

const validate = new Ajv2020({ allErrors: true }).compile(
  object({ $schema: string, version: { const: '2.1.0' }, runs: list(run) }, ['version', 'runs']),
)

/**
 * Answers every way in which a log is not as the standard has it, of the members that a check may use.
 * Written from the standard's text; the published logs of `vectors/sarif.json` keep it honest.
 * @see https://docs.oasis-open.org/sarif/sarif/v2.1.0/errata01/os/sarif-v2.1.0-errata01-os.html
 */
export function sarifFaults(log: unknown): string[] {
  validate(log)
  return (validate.errors ?? []).map(({ instancePath, message: said }) => `${instancePath} ${said}`)
}
