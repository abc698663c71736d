import * as z from 'zod'

// Zod tries `new Function` when a schema is made; the content security policy would refuse and report it.
z.config({ jitless: true })
