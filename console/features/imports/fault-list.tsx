/** One thing that is wrong with a file, and where. */
export interface FileFault {
  /** A pointer into the file, or the name of what was chosen beside it; none of the file as a whole. */
  readonly place: string
  readonly detail: string
}

/** Every fault of a file, each with its place. */
export function FaultList({ faults, more }: { faults: readonly FileFault[]; more: number }) {
  return (
    <div className="ledger mt-14 overflow-x-clip">
      <table aria-label="What is wrong with it">
        <thead>
          <tr>
            <th className="w-[42%] @max-[620px]:w-auto">Where in the file</th>
            <th className="@max-[620px]:hidden">What is wrong</th>
          </tr>
        </thead>
        <tbody>
          {faults.map(({ place, detail }) => (
            <tr key={`${place} ${detail}`}>
              <td className="row-start py-6! pr-16! align-top!">
                <span className="font-medium break-all">{place === '' ? 'the whole' : place}</span>
                <span className="hidden break-words @max-[620px]:block">{detail}</span>
              </td>
              <td className="py-6! align-top! break-words @max-[620px]:hidden">{detail}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {more > 0 && <p className="pt-10 text-ink-soft">And {more.toLocaleString('en-GB')} more.</p>}
    </div>
  )
}
