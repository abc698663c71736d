import { Choice } from '#console/ui/choice.tsx'
import { LineField } from '#console/ui/line-field.tsx'
import type { ImportOptions } from './import-options.ts'

const MODES = [
  { value: 'merge', text: 'stays as it is' },
  { value: 'replace', text: 'is removed' },
] as const
const HEX = [
  { value: 'false', text: 'are refused' },
  { value: 'true', text: 'are read too, and listed' },
] as const
const HYPHENS = [
  { value: 'false', text: 'action-board' },
  { value: 'true', text: 'action.board' },
] as const

/** How a file is read, as sentences. */
export function ImportSentence({
  options,
  kind,
  isNamingSpan,
  onChange,
}: {
  options: ImportOptions
  /** Of the file in hand, where it can be read. */
  kind: 'document' | 'sheet' | undefined
  /** Whether themes may come that the file does not say ground and ink of. */
  isNamingSpan: boolean
  onChange: (options: ImportOptions) => void
}) {
  return (
    <div className="mt-18 max-w-820 leading-26">
      <p className="inline">
        What the file does not name{' '}
        <Choice
          label="What the file does not name"
          value={options.mode}
          options={MODES}
          onChange={(mode) => onChange({ ...options, mode })}
        />
        .{' '}
        {kind !== 'sheet' && (
          <>
            Colours written as text of hexadecimal digits{' '}
            <Choice
              label="Hexadecimal text"
              value={options.legacyHex ? 'true' : 'false'}
              options={HEX}
              onChange={(legacyHex) => onChange({ ...options, legacyHex: legacyHex === 'true' })}
            />
            .{' '}
          </>
        )}
        {kind !== 'document' && (
          <>
            In a style sheet <span className="whitespace-nowrap">--action-board</span> is the token{' '}
            <Choice
              label="Names in a style sheet"
              value={options.hyphensAsDots ? 'true' : 'false'}
              options={HYPHENS}
              onChange={(dots) => onChange({ ...options, hyphensAsDots: dots === 'true' })}
            />
            .
          </>
        )}
      </p>
      {isNamingSpan && (
        <div className="mt-12 flex flex-wrap items-end gap-x-28 gap-y-12">
          <LineField
            label="Ground of themes whose file does not name it"
            value={options.ground}
            placeholder="a token of the file"
            autoComplete="off"
            spellCheck={false}
            onChange={({ target }) => onChange({ ...options, ground: target.value })}
            className="w-full wide:w-300"
          />
          <LineField
            label="Ink of themes whose file does not name it"
            value={options.ink}
            placeholder="a token of the file"
            autoComplete="off"
            spellCheck={false}
            onChange={({ target }) => onChange({ ...options, ink: target.value })}
            className="w-full wide:w-300"
          />
        </div>
      )}
    </div>
  )
}
