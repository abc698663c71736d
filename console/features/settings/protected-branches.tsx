import { useState } from 'react'
import { WordButton } from '#console/ui/button.tsx'
import { LineField } from '#console/ui/line-field.tsx'
import type { ProtectedBranchWire } from '#shared/contracts/systems.contract.ts'
import { branchInWords } from './settings-draft.ts'

/** The branches whose breaches in CI stand in the breach log. */
export function ProtectedBranches({
  branches,
  onChange,
}: {
  branches: readonly ProtectedBranchWire[]
  onChange: (branches: readonly ProtectedBranchWire[]) => void
}) {
  const [repository, setRepository] = useState('')
  const [branch, setBranch] = useState('')
  const added = { repository: repository.trim(), branch: branch.trim() }
  const isWhole = added.repository !== '' && added.branch !== ''
  const isThere = branches.some((one) => branchInWords(one) === branchInWords(added))
  const add = () => {
    if (!isThere) onChange([...branches, added])
    setRepository('')
    setBranch('')
  }
  return (
    <>
      <p>
        {branches.length === 0
          ? 'No branch is protected: what pipelines find short is kept for 30 days, and opens no breach.'
          : 'What pipelines find short on these opens a breach in the log:'}
      </p>
      {branches.length > 0 && (
        <ul className="mt-4">
          {branches.map((one) => (
            <li
              key={branchInWords(one)}
              className="flex min-h-34 max-w-560 items-center justify-between gap-x-20 border-b border-feint"
            >
              <span className="min-w-0 break-words">
                <span className="font-medium">{one.branch}</span>
                <span className="text-ink-soft"> of {one.repository}</span>
              </span>
              <WordButton
                aria-label={`Take away ${branchInWords(one)}`}
                onClick={() => onChange(branches.filter((each) => each !== one))}
              >
                Take away
              </WordButton>
            </li>
          ))}
        </ul>
      )}
      <div className="mt-12 flex flex-wrap items-end gap-x-20 gap-y-12">
        <LineField
          label="Branch, * for any characters"
          value={branch}
          maxLength={255}
          autoComplete="off"
          spellCheck={false}
          onChange={(event) => setBranch(event.target.value)}
          className="w-full wide:w-180"
        />
        <LineField
          label="Repository"
          value={repository}
          maxLength={255}
          autoComplete="off"
          spellCheck={false}
          onChange={(event) => setRepository(event.target.value)}
          className="w-full wide:w-220"
        />
        <WordButton disabled={!isWhole} onClick={add}>
          Protect it
        </WordButton>
      </div>
    </>
  )
}
