import { formatComponent, formatHue } from '#console/lib/format.ts'
import { LineField } from '#console/ui/line-field.tsx'
import { deltaEOk } from '#shared/color/difference.ts'
import type { Oklch } from '#shared/color/oklch.ts'
import { ComponentField } from './component-field.tsx'
import { GAMUT_WORDS, shortOklch, type TrialReading } from './trial.ts'

/** A colour that a token has now. */
export interface PresentColor {
  readonly color: Oklch
  readonly hex: string
}

/** The fields of a trial: any CSS colour, its components, and what was understood. */
export function TrialFields({
  text,
  reading,
  present,
  fault,
  onText,
}: {
  text: string
  reading: TrialReading
  present: PresentColor
  /** The service's own objection to the value. */
  fault: string | undefined
  onText: (text: string) => void
}) {
  const color = reading.kind === 'color' ? reading.color : present.color
  const put = (part: Partial<Oklch>) => onText(shortOklch({ ...color, ...part }))
  return (
    <div className="flex flex-wrap items-start gap-x-20 gap-y-14">
      <LineField
        label="Trying, any CSS colour"
        value={text}
        onChange={(event) => onText(event.target.value)}
        autoComplete="off"
        spellCheck={false}
        fault={reading.kind === 'unread' ? reading.reason : fault}
        className="w-full wide:w-250"
      />
      <div className="flex w-full gap-x-16 wide:w-auto wide:gap-x-20">
        <ComponentField
          label="Lightness"
          value={color.l}
          text={formatComponent(color.l)}
          step={0.005}
          onChange={(l) => put({ l: Math.min(Math.max(l, 0), 1) })}
        />
        <ComponentField
          label="Chroma"
          value={color.c}
          text={formatComponent(color.c)}
          step={0.004}
          onChange={(c) => put({ c: Math.max(c, 0) })}
        />
        <ComponentField
          label="Hue"
          value={color.h}
          text={formatHue(color.h)}
          step={1}
          onChange={(h) => put({ h: ((h % 360) + 360) % 360 })}
        />
        <ComponentField
          label="Alpha"
          value={color.alpha}
          text={color.alpha === null ? 'none' : String(Number(color.alpha.toFixed(3)))}
          step={0.05}
          onChange={(alpha) => put({ alpha: Math.min(Math.max(alpha, 0), 1) })}
        />
      </div>
      <Understood reading={reading} present={present} />
    </div>
  )
}

function Understood({ reading, present }: { reading: TrialReading; present: PresentColor }) {
  if (reading.kind === 'unread') return null
  return (
    <p aria-live="polite" className="pt-6 text-ink-soft">
      {reading.kind === 'alias' ? (
        <>
          Understood as <span className="text-ink">an alias of {reading.name}</span>
        </>
      ) : (
        <>
          Understood as{' '}
          <span className="text-ink">
            {reading.notation}, {GAMUT_WORDS[reading.rendered.gamut]}, shown as {reading.hex}
          </span>
          <br />
          <span className="text-13">
            ΔE OK {deltaEOk(reading.color, present.color).toFixed(3)} from the present {present.hex}
          </span>
        </>
      )}
    </p>
  )
}
