import { spawn } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { inject } from 'vitest'

export interface GateRun {
  readonly code: number | null
  readonly out: string
  readonly err: string
}

/** The built gate in a working directory of its own. Call in `beforeAll`, `remove()` in `afterAll`. */
export interface GateProcess {
  readonly folder: string
  /** Runs it as a pipeline would, with nothing of this process's environment. */
  run(args: readonly string[], env?: Readonly<Record<string, string>>): Promise<GateRun>
  /** Writes a file into the working directory and gives its name back. */
  write(name: string, content: unknown): string
  remove(): void
}

export function createGateProcess(): GateProcess {
  const folder = mkdtempSync(join(tmpdir(), 'dyewright-gate-'))
  const program = join(inject('dist'), 'gate/dyewright.mjs')
  return {
    folder,
    run: (args, env = {}) =>
      new Promise((resolve) => {
        const gate = spawn(process.execPath, [program, ...args], { cwd: folder, env })
        let [out, err] = ['', '']
        gate.stdout.setEncoding('utf8').on('data', (text: string) => {
          out += text
        })
        gate.stderr.setEncoding('utf8').on('data', (text: string) => {
          err += text
        })
        gate.on('close', (code) => resolve({ code, out, err }))
      }),
    write: (name, content) => {
      writeFileSync(join(folder, name), JSON.stringify(content))
      return name
    },
    remove: () => rmSync(folder, { recursive: true }),
  }
}
