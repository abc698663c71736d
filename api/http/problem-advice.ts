import type { ProblemCode } from '#shared/contracts/problems.ts'

/** What a person can do about each refusal, one or two sentences of plain text. */
export const PROBLEM_ADVICE: Readonly<Record<ProblemCode, string>> = {
  'request-unreadable':
    'The body is not JSON in UTF-8, is nested deeper than 32, or the address cannot be decoded. Nothing was done.',
  'parameter-invalid':
    'A query parameter, a part of the path or a header is unknown or has a value that cannot be used. Each entry of errors names one.',
  'host-unknown':
    'The Host of the request is neither a loopback name nor that of PUBLIC_URL. Whoever runs the service sets PUBLIC_URL to the address people use.',
  'sign-in-required':
    'The call takes a session or a key. Sign in, or send Authorization: Bearer with a key. A session ends after 30 minutes without a call and after 12 hours in all.',
  'credentials-wrong':
    'No account has this e-mail address with this password. Which of the two is wrong is not said.',
  'key-refused':
    'The key is mistyped, expired, revoked, or its owner has left the system. Make a new one; a key is never shown twice. A bad key is refused even beside a good session.',
  'role-missing':
    'Your role in this system does not allow the call; detail names the roles that do. An administrator grants roles.',
  'scope-missing':
    'The key does not have the scope that the call takes; detail names it. Make a key with that scope.',
  'weakening-needs-approval':
    'The edit asks for less than before, or lets a breach vanish without mending a colour; each entry of errors names one way. An accessibility lead edits exemptions, levels and which themes gate; anything else that weakens goes into a change that an accessibility lead approves.',
  'origin-foreign':
    'A browser sent this from a page that is not part of this service, or a password would have travelled without https. Nothing was done.',
  'not-found': 'It does not exist, or you are not allowed to know of it.',
  'method-not-allowed': 'The address exists, but not for this method. Allow lists those it takes.',
  'not-acceptable':
    'Accept asks only for types that the call cannot give. Ask for application/json.',
  'request-timed-out':
    'The head of a request has 10 seconds, the whole of it 15. The connection was closed: send the request again, in one go.',
  'system-key-taken': 'Choose another key: keys of systems are unique.',
  'token-name-taken':
    'Names of tokens are unique, also after Unicode normalisation. Choose another name.',
  'token-in-use':
    'A pair, an alias, a derivation, a rule, a theme or a distinct set uses the token; detail names them. Change those first.',
  'token-locked': 'The token is locked. Unlock it in an edit of its own, then change it.',
  'pair-already-declared':
    'A pair with the same colours, use, relation, backdrop, group and product is declared already. Edit that one.',
  'distinct-set-name-taken': 'Names of distinct sets are unique. Choose another name.',
  'theme-in-use': 'Another theme derives from it, or it is the base. Change that first.',
  'css-name-collision':
    'Two token names come to the same CSS custom property; detail names both. Rename one.',
  'idempotency-key-running':
    'A request with the same Idempotency-Key is being worked on. Wait as long as Retry-After says, then send it again: it is answered as the first was.',
  'review-required':
    'The system takes edits by review only. An accessibility lead may set direct writes again.',
  'precondition-failed':
    'Somebody has changed it since you read it. The member current is how it stands now: read it, decide, send again with its ETag.',
  'request-too-large':
    'The body has more bytes than the call takes; detail says how many it takes.',
  'media-type-unsupported': 'Send the body as application/json in UTF-8, not compressed.',
  'request-invalid':
    'The request was read, but it cannot be done as it is. Each entry of errors points at one fault in the body; all of them are listed.',
  'idempotency-key-reused':
    'The same Idempotency-Key came with another body, query or Accept within 24 hours. Give every new request a key of its own.',
  'system-unresolvable':
    'With this edit a colour of the system could not be computed: a reference leads nowhere or in a circle, or a theme breaks a rule. Each entry of errors names one fault.',
  'precondition-required':
    'An edit says which version it is meant for: send If-Match with the ETag that you read, or If-None-Match: * to create.',
  'rate-limited':
    'The address, the key or the system has sent as many requests as it may in the present window; detail says which. RateLimit says what is left of each budget. Wait as long as Retry-After says.',
  'requests-too-many': 'Wait as long as Retry-After says, then try again.',
  'request-head-too-large':
    'Address and header fields together may have 16 KiB. Send fewer or shorter ones.',
  'server-unexpected':
    'A fault of ours. Nothing was half done. Tell whoever runs the service the requestId.',
  'job-interrupted':
    'The process that worked on it ended, or was held up for longer than its lease. Nothing was half done: ask for the work again.',
  'service-unavailable':
    'The database is away, or the service is starting or stopping. Nothing was half done: try again as Retry-After says.',
}
