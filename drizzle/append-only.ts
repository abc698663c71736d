/**
 * Tables whose rows never change once written. The service's user has no UPDATE or DELETE grant on them
 * (drizzle/grants.ts) and triggers in the migrations refuse both to everybody.
 */
export const APPEND_ONLY_TABLES: readonly string[] = [
  'audit_entries',
  'release_artifacts',
  'release_withdrawals',
  'releases',
  'revisions',
]
