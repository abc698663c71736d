import './lib/zod-without-eval.ts'
import '@fontsource/inter/latin-400.css'
import '@fontsource/inter/latin-500.css'
import '@fontsource/inter/latin-600.css'
import './ui/theme.css'
import { StrictMode } from 'react'
import { createRoot } from 'react-dom/client'
import { Providers } from './app/providers.tsx'

const root = document.getElementById('root')
if (root === null) throw new TypeError('index.html has no #root')
createRoot(root).render(
  <StrictMode>
    <Providers />
  </StrictMode>,
)
