import { useQuery, useQueryClient } from '@tanstack/react-query'
import type { GivenFile } from './given-file.ts'

/** What a page keeps of a file while another page is looked at. */
export interface KeptFile {
  readonly given?: GivenFile
  /** Why what was given last could not be taken. */
  readonly fault?: string
  /** The work that the file was sent to, and how it was to be read. */
  readonly job?: { readonly id: string; readonly options: string }
}

const NOTHING: KeptFile = {}

/** The file that was given for a system, as long as the console is open; ended with the session. */
export function useKeptFile(system: string) {
  const client = useQueryClient()
  const queryKey = ['given-file', system]
  const { data } = useQuery({
    queryKey,
    queryFn: () => NOTHING,
    initialData: NOTHING,
    staleTime: Number.POSITIVE_INFINITY,
    gcTime: Number.POSITIVE_INFINITY,
    structuralSharing: false,
  })
  const keep = (kept: KeptFile) => {
    client.setQueryData<KeptFile>(queryKey, kept)
  }
  return [data, keep] as const
}
