import { Choice } from '#console/ui/choice.tsx'
import { WordButton } from '#console/ui/button.tsx'
import { NameBox } from '#console/ui/name-box.tsx'
import type { PairFields } from './pair-draft.ts'

const BACKDROP_CHOICES = [
  { value: 'ground', text: 'the ground alone' },
  { value: 'layers', text: 'further colours on the ground' },
  { value: 'unknown', text: 'what nobody knows: the worst is taken' },
] as const

/** As many layers as a pair may have. */
const MOST_LAYERS = 16

/** What lies under the background: the ground, further layers on it, or nobody knows. */
export function BackdropFields({
  backdrop,
  tokens,
  fault,
  onChange,
}: {
  backdrop: PairFields['backdrop']
  tokens: readonly string[]
  fault: string | undefined
  onChange: (backdrop: PairFields['backdrop']) => void
}) {
  const kind = backdrop === 'unknown' ? 'unknown' : backdrop.length === 0 ? 'ground' : 'layers'
  const layers = backdrop === 'unknown' ? [] : backdrop
  const put = (at: number, name: string) =>
    onChange(
      layers.map((layer, place) => (place === at ? name : layer)).filter((name) => name !== ''),
    )
  return (
    <div className="min-w-0 full:col-span-2">
      <div className="flex flex-wrap items-baseline gap-x-8 gap-y-4">
        Under the background lies
        <Choice
          label="Backdrop"
          value={kind}
          options={BACKDROP_CHOICES}
          onChange={(next) =>
            onChange(
              next === 'unknown'
                ? 'unknown'
                : next === 'ground'
                  ? []
                  : layers.length > 0
                    ? layers
                    : tokens.slice(0, 1),
            )
          }
        />
      </div>
      {layers.length > 0 && (
        <div className="mt-8 flex flex-wrap items-end gap-x-20 gap-y-10">
          {layers.map((layer, at) => (
            <NameBox
              // biome-ignore lint/suspicious/noArrayIndexKey: a layer is known by its place alone, one token may lie twice
              key={at}
              label={`Layer ${at + 1}${at === 0 ? ', on the ground' : ''}`}
              value={layer}
              names={tokens}
              onChange={(name) => put(at, name)}
              className="w-full wide:w-200"
            />
          ))}
          {layers.length < MOST_LAYERS && (
            <WordButton onClick={() => onChange([...layers, tokens[0] ?? ''])}>
              Lay another on it
            </WordButton>
          )}
        </div>
      )}
      {fault !== undefined && <p className="mt-4 text-13 font-semibold text-madder">{fault}</p>}
    </div>
  )
}
