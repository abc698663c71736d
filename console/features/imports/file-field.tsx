import { type DragEvent, type ReactNode, useRef, useState } from 'react'
import { WordButton } from '#console/ui/button.tsx'
import { LineArea } from '#console/ui/line-area.tsx'
import { type GivenFile, sizeInWords } from './given-file.ts'

/** Up to here what is pasted stands in a field; a larger text is a file like any other. */
const MOST_SHOWN = 100_000

/** Where a file is chosen, dropped or pasted; what was given stays until another is. */
export function FileField({
  given,
  fault,
  onFile,
  onPaste,
  onPutAway,
  children,
}: {
  given: GivenFile | undefined
  /** Why what was given cannot be read, as a sentence. */
  fault: string | undefined
  onFile: (file: File) => void
  onPaste: (text: string) => void
  onPutAway: () => void
  /** What else there is to say about the file. */
  children?: ReactNode
}) {
  const [isOver, setOver] = useState(false)
  const isField = given === undefined || (given.name === undefined && given.bytes <= MOST_SHOWN)
  const drop = (event: DragEvent) => {
    event.preventDefault()
    setOver(false)
    const [file] = event.dataTransfer.files
    if (file !== undefined) onFile(file)
  }
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: dropping is a short way to what the button inside does
    <div
      onDragOver={(event) => {
        event.preventDefault()
        setOver(true)
      }}
      onDragLeave={() => setOver(false)}
      onDrop={drop}
      className={isOver ? 'outline-2 outline-offset-8 outline-woad' : ''}
    >
      <div className="flex flex-wrap items-baseline gap-x-22 gap-y-8">
        {given !== undefined && !isField && (
          <p className="min-w-0">
            <span className="font-medium break-words">{given.name ?? 'What was pasted'}</span>{' '}
            <span className="text-ink-soft">{sizeInWords(given.bytes)}</span>
          </p>
        )}
        <ChooseFile isAnother={!isField} onFile={onFile} />
        {given !== undefined && <WordButton onClick={onPutAway}>Put it away</WordButton>}
        {children}
      </div>
      {isField ? (
        <LineArea
          label="or drop it here, or paste what it says"
          rows={4}
          value={given?.text ?? ''}
          spellCheck={false}
          autoComplete="off"
          fault={fault}
          onChange={(event) => onPaste(event.target.value)}
          className="mt-12"
        />
      ) : (
        fault !== undefined && (
          <p role="alert" className="mt-8 font-semibold text-madder">
            {fault}
          </p>
        )
      )}
    </div>
  )
}

function ChooseFile({ isAnother, onFile }: { isAnother: boolean; onFile: (file: File) => void }) {
  const input = useRef<HTMLInputElement>(null)
  return (
    <>
      <input
        ref={input}
        type="file"
        accept=".json,.tokens,.css,application/json,text/css"
        hidden
        onChange={(event) => {
          const [file] = event.target.files ?? []
          // Emptied, so that the same file is taken again once it was edited.
          event.target.value = ''
          if (file !== undefined) onFile(file)
        }}
      />
      <WordButton onClick={() => input.current?.click()}>
        Choose {isAnother ? 'another' : 'a'} file
      </WordButton>
    </>
  )
}
