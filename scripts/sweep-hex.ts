import { formatHex } from '#shared/color/format-color.ts'
import { parseColor } from '#shared/color/parse-color.ts'
import { renderColor } from '#shared/color/render.ts'

// Proves hex → OKLCH → hex for all 16,777,216 colors, through the very functions that the service calls.
const COLORS = 2 ** 24
const started = Date.now()
const moved: string[] = []
let outside = 0

for (let n = 0; n < COLORS; n++) {
  const hex = formatHex(n >> 16, (n >> 8) & 255, n & 255)
  const reading = parseColor(hex)
  if (!reading.ok) {
    moved.push(`${hex} was refused: ${reading.reason}`)
    continue
  }
  const { r, g, b, a, gamut } = renderColor(reading.color)
  const back = formatHex(r, g, b, a)
  if (back !== hex) moved.push(`${hex} came back as ${back}`)
  if (gamut !== 'srgb') outside++
  if (n % 2 ** 21 === 2 ** 21 - 1) console.log(`${Math.round(((n + 1) / COLORS) * 100)} %`)
}

const seconds = ((Date.now() - started) / 1000).toFixed(1)
console.log(`${COLORS} colors, ${moved.length} moved, ${outside} out of sRGB, ${seconds} s`)
for (const line of moved.slice(0, 20)) console.log(line)
process.exitCode = moved.length + outside > 0 ? 1 : 0
