import { type IRouter, Router } from 'express'
import { AppError } from '#api/errors.ts'
import { PROBLEMS, type ProblemCode } from '#shared/contracts/problems.ts'
import { onlyReads } from './allow.ts'
import { PROBLEM_ADVICE } from './problem-advice.ts'

const STYLE = `:root { color-scheme: light dark; --ground: #f4f3ed; --ink: #132136; --line: #c6d4dd }
@media (prefers-color-scheme: dark) { :root { --ground: #0e1d30; --ink: #eceae1; --line: #2b3d51 } }
body { margin: 0; background: var(--ground); color: var(--ink); font: 1rem/1.5 Inter, system-ui, sans-serif }
main { max-width: 38rem; margin: 0 auto; padding: 3rem 1.25rem }
h1 { font-size: 1.5rem; line-height: 1.2 }
dl { display: grid; grid-template-columns: max-content 1fr; gap: 0.25rem 1.5rem; border-top: 1px solid var(--line); padding-top: 1rem }
dd { margin: 0 }
ul { padding: 0; list-style: none }
li { border-top: 1px solid var(--line); padding: 0.5rem 0 }
a { color: inherit }
`

const codes = Object.keys(PROBLEMS) as ProblemCode[]

/** All texts are ours and have no character that HTML takes for its own. */
const page = (title: string, content: string): string =>
  `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${title} – Dyewright</title>
<link rel="stylesheet" href="/problems/style.css">
</head>
<body><main>
${content}
</main></body>
</html>
`

const problemPage = (code: ProblemCode): string => {
  const { status, title } = PROBLEMS[code]
  return page(
    title,
    `<h1>${title}</h1>
<p>${PROBLEM_ADVICE[code]}</p>
<dl><dt>Code</dt><dd>${code}</dd><dt>HTTP status</dt><dd>${status}</dd></dl>
<p>The answer's <code>detail</code> and <code>errors</code> say what it was this time; its <code>requestId</code> finds the line in the log.</p>
<p><a href="/problems">All refusals</a></p>`,
  )
}

const listPage = (): string =>
  page(
    'Refusals',
    `<h1>Refusals</h1>
<ul>
${codes.map((code) => `<li><a href="/problems/${code}">${code}</a> (${PROBLEMS[code].status}): ${PROBLEMS[code].title}</li>`).join('\n')}
</ul>`,
  )

const absentPage = (): string =>
  page(
    'No such refusal',
    `<h1>No refusal has this code</h1>
<p>The type of a problem document is the address of its page: /problems/ and the code, in small letters.</p>
<p><a href="/problems">All refusals</a></p>`,
  )

const isCode = (text: string): text is ProblemCode => Object.hasOwn(PROBLEMS, text)

/** Serves, for each refusal, the page that a problem's `type` leads to. */
export function serveProblemPages(): IRouter {
  const router = Router({ caseSensitive: true, strict: true })
  router.all(['/problems', '/problems/:code'], onlyReads)
  router.get('/problems', (_request, response) => {
    response.type('html').send(listPage())
  })
  router.get('/problems/style.css', (_request, response) => {
    response.type('css').send(STYLE)
  })
  router.get('/problems/:code', (request, response) => {
    const { code } = request.params
    if (isCode(code)) response.type('html').send(problemPage(code))
    else if (request.accepts(['json', 'html']) === 'html') {
      response.status(404).type('html').send(absentPage())
    } else throw new AppError('not-found', { detail: 'No refusal has this code: see /problems' })
  })
  return router
}
