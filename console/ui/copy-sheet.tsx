import { useState } from 'react'

/** What is to be copied, on a sheet of its own. */
export function CopySheet({ label, text }: { label: string; text: string }) {
  const [done, setDone] = useState<'copied' | 'refused'>()
  async function copy() {
    try {
      await navigator.clipboard.writeText(text)
      setDone('copied')
    } catch {
      setDone('refused')
    }
  }
  return (
    <div className="flex flex-wrap items-start justify-between gap-x-20 gap-y-10 border border-edge bg-ground-sheet px-16 py-12">
      <pre className="figures min-w-0 font-sans break-all whitespace-pre-wrap select-all">
        {text}
      </pre>
      <span className="flex items-center gap-x-14">
        <span role="status" className="text-13 text-ink-soft">
          {done === 'copied' && 'Copied'}
          {done === 'refused' && 'The browser does not let it be copied; select it'}
        </span>
        <button
          type="button"
          aria-label={`Copy ${label}`}
          onClick={() => void copy()}
          className="min-h-30 border border-ink px-14 font-medium hover:bg-ground-deep"
        >
          Copy
        </button>
      </span>
    </div>
  )
}
