import { readFileSync } from 'node:fs'

/** Reads a published vector file; every case in it names its source. */
export function readVectors<Shape>(name: string): Shape {
  return JSON.parse(readFileSync(new URL(`./vectors/${name}.json`, import.meta.url), 'utf8'))
}
