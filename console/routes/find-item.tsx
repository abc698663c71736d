import { useEffect } from 'react'
import { Link, useNavigate } from 'react-router-dom'
import { paths } from '#console/app/paths.ts'

/** The way to the ledger's filter from anywhere in a system, also by the key `/`. */
export function FindItem({ system }: { system: string }) {
  const navigate = useNavigate()
  const find = `${paths.tokens(system)}#find`
  useEffect(() => {
    function onKeyDown(event: KeyboardEvent) {
      if (event.key !== '/' || event.ctrlKey || event.metaKey || event.altKey) return
      if (event.target instanceof HTMLElement && isWriting(event.target)) return
      event.preventDefault()
      const field = document.getElementById('find')
      if (field === null) void navigate(find)
      else field.focus()
    }
    window.addEventListener('keydown', onKeyDown)
    return () => window.removeEventListener('keydown', onKeyDown)
  }, [navigate, find])
  return (
    <li>
      <Link to={find} className="hover:underline">
        Find <kbd className="ml-6 border border-rule px-5 font-sans text-12 text-ink-soft">/</kbd>
      </Link>
    </li>
  )
}

function isWriting(element: HTMLElement): boolean {
  return element.isContentEditable || ['INPUT', 'TEXTAREA', 'SELECT'].includes(element.tagName)
}
