import { createServer, type Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { MOST_FILE_BYTES } from '#shared/contracts/imports.contract.ts'
import { createTestApp, type TestApp } from '#tests/support/app.ts'
import { createSampleSystem, dtcgHex, type SampleSystem } from '#tests/support/sample-system.ts'

let test: TestApp
let system: SampleSystem
let server: Server
let key: string
beforeAll(async () => {
  test = await createTestApp()
  system = await createSampleSystem(test)
  const { body } = await system.maintainer
    .post(`${system.url}/keys`)
    .send({ name: 'upload', scopes: ['tokens:write'] })
    .expect(201)
  key = body.key
  server = createServer(test.service.app).listen(0, '127.0.0.1')
  await new Promise((resolve) => server.once('listening', resolve))
})
afterAll(async () => {
  server.closeAllConnections()
  server.close()
  await test.close()
})

interface Sent {
  readonly body: RequestInit['body']
  readonly headers?: Record<string, string>
  readonly query?: string
  readonly path?: string
}

/** Over a real connection: the client's own form encoder and a body of any bytes. */
async function send({ body, headers = {}, query = '?dryRun=true', path = '/imports' }: Sent) {
  const { port } = server.address() as AddressInfo
  const answer = await fetch(`http://127.0.0.1:${port}${system.url}${path}${query}`, {
    method: 'POST',
    headers: { Authorization: `Bearer ${key}`, ...headers },
    body: body ?? null,
  })
  return { status: answer.status, body: JSON.parse(await answer.text()) }
}

function formOf(content: string | Uint8Array<ArrayBuffer>, name = 'brand.tokens.json', type = '') {
  const form = new FormData()
  form.append('file', new Blob([content], { type }), name)
  return form
}

const FILE = JSON.stringify({ mark: dtcgHex('#112233') })
const code = ({ body }: { body: { type: string } }) => body.type.split('/').at(-1)

describe('a form', () => {
  it.each([
    ['application/json'],
    ['application/design-tokens+json'],
    ['application/octet-stream'],
    [''],
  ])('answers a file of type %j as the same JSON body', async (type) => {
    const form = await send({ body: formOf(FILE, 'brand.tokens', type) })
    const headers = { 'Content-Type': 'application/design-tokens+json' }
    const plain = await send({ body: FILE, headers })
    expect(form.status).toBe(200)
    // What is new gets an id of its own in each run.
    const [added] = form.body.changes
    expect(added).toMatchObject({ operation: 'added', name: 'mark' })
    expect({ ...form.body, changes: [] }).toEqual({ ...plain.body, changes: [] })
  })

  it('answers whatever the file is called', async () => {
    for (const name of ['../../etc/passwd', 'é 🎨.json', 'x'.repeat(5000)]) {
      expect((await send({ body: formOf(FILE, name) })).status, name).toBe(200)
    }
  })

  it('answers a file that begins with a byte order mark', async () => {
    expect((await send({ body: formOf(`\ufeff${FILE}`) })).status).toBe(200)
  })

  it('refuses faults of the file with pointers into the file', async () => {
    const answer = await send({ body: formOf('{"a":{"$type":"color","$value":"red"}}') })
    expect(answer.status).toBe(422)
    expect(answer.body.errors).toMatchObject([{ pointer: '/a/$value' }])
  })

  it.each([
    ['nothing', new FormData()],
    ['a field', withField('file', FILE)],
    ['a file in another field', withFile('upload')],
    ['two files', withFile('file', 'file')],
    ['a file and a field', withFileAndField()],
  ])('refuses a form that holds %s', async (_, body) => {
    const answer = await send({ body })
    expect(answer.status).toBe(422)
    expect(answer.body.errors).toMatchObject([{ detail: expect.stringContaining('one file') }])
  })

  it('refuses a form anywhere else', async () => {
    const answer = await send({ body: formOf(FILE), path: '/tokens', query: '' })
    expect([answer.status, code(answer)]).toEqual([415, 'media-type-unsupported'])
  })
})

function withField(name: string, text: string) {
  const form = new FormData()
  form.append(name, text)
  return form
}
function withFile(...fields: string[]) {
  const form = new FormData()
  for (const field of fields) form.append(field, new Blob([FILE]), 'a.json')
  return form
}
function withFileAndField() {
  const form = withFile('file')
  form.append('mode', 'replace')
  return form
}

describe('size', () => {
  const filled = (bytes: number) => {
    const open = '{"$description":"'
    return `${open}${'x'.repeat(bytes - open.length - 2)}"}`
  }

  it('answers 8 MiB exactly, and refuses one byte more with the limit', async () => {
    expect((await send({ body: formOf(filled(MOST_FILE_BYTES)) })).status).toBe(200)
    const answer = await send({ body: formOf(filled(MOST_FILE_BYTES + 1)) })
    expect(answer.status).toBe(413)
    expect(answer.body).toMatchObject({ limitBytes: MOST_FILE_BYTES })
    const headers = { 'Content-Type': 'application/json' }
    expect((await send({ body: filled(MOST_FILE_BYTES), headers })).status).toBe(200)
    expect((await send({ body: filled(MOST_FILE_BYTES + 1), headers })).status).toBe(413)
  })

  it('refuses by its announced length what is larger still', async () => {
    const answer = await send({ body: formOf(filled(MOST_FILE_BYTES + 2 ** 20)) })
    expect([answer.status, code(answer)]).toEqual([413, 'request-too-large'])
  })
})

describe('a broken form', () => {
  const multipart = 'multipart/form-data; boundary=b'
  const part = (content: string, end = '\r\n--b--\r\n') =>
    `--b\r\nContent-Disposition: form-data; name="file"; filename="a.json"\r\n\r\n${content}${end}`

  it.each([
    ['no boundary', 'multipart/form-data', part(FILE)],
    ['an end before the last boundary', multipart, part(FILE, '')],
    ['another boundary', 'multipart/form-data; boundary=other', part(FILE)],
    ['a part without a header', multipart, `--b\r\n\r\n${FILE}\r\n--b--\r\n`],
    ['nothing at all', multipart, ''],
    ['a header without end', multipart, `--b\r\nX: ${'y'.repeat(100_000)}\r\n\r\n--b--\r\n`],
  ])('refuses %s', async (_, type, body) => {
    const answer = await send({ body, headers: { 'Content-Type': type } })
    expect([400, 422]).toContain(answer.status)
    expect(answer.body.type).toMatch(/^\/problems\/request-(unreadable|invalid)$/)
  })

  it('refuses 20,000 empty parts as no form of one file', async () => {
    const parts = '--b\r\nContent-Disposition: form-data; name="x"\r\n\r\n\r\n'.repeat(20_000)
    const answer = await send({ body: `${parts}--b--\r\n`, headers: { 'Content-Type': multipart } })
    expect(answer.status).toBe(422)
  })

  it('refuses a form or a part that is compressed', async () => {
    const headers = { 'Content-Type': multipart, 'Content-Encoding': 'gzip' }
    expect((await send({ body: part(FILE), headers })).status).toBe(415)
    const gzipped = new Uint8Array([0x1f, 0x8b, 8, 0, 0, 0, 0, 0])
    const answer = await send({ body: formOf(gzipped, 'a.json.gz', 'application/gzip') })
    expect([answer.status, code(answer)]).toEqual([400, 'request-unreadable'])
  })

  it.each(['multipart/mixed; boundary=b', 'multipart/form-datax; boundary=b', 'text/css'])(
    'refuses %s with 415',
    async (type) => {
      const answer = await send({ body: part(FILE), headers: { 'Content-Type': type } })
      expect(answer.status).toBe(415)
    },
  )
})

describe('an Idempotency-Key', () => {
  const once = (body: Sent['body'], idempotencyKey: string) =>
    send({ body, query: '', headers: { 'Idempotency-Key': `"${idempotencyKey}"` } })

  it('answers the same file as the first time, and refuses another', async () => {
    const first = await once(formOf(FILE, 'one.json'), 'upload')
    expect(first.body).toMatchObject({ written: true, counts: { tokens: { added: 1 } } })
    expect((await once(formOf(FILE, 'two.json'), 'upload')).body).toEqual(first.body)
    const other = await once(formOf(JSON.stringify({ mark: dtcgHex('#332211') })), 'upload')
    expect([other.status, code(other)]).toEqual([422, 'idempotency-key-reused'])
  })
})
