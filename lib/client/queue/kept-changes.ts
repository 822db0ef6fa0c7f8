import { z } from 'zod'
import { readingSchema } from '@/diagrams/document/reading-schema'

const changeSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('put'), reading: readingSchema }),
  z.object({ kind: z.literal('remove'), readingId: z.string() }),
  z.object({ kind: z.literal('answer-cautions') }),
])
/** Something entered into a trace that the server has not confirmed yet. */
export type Change = z.infer<typeof changeSchema>

/** What the queue needs of `localStorage`. */
export interface Store {
  getItem(key: string): string | null
  setItem(key: string, value: string): void
  removeItem(key: string): void
}

/** What an earlier visit left on this tablet. */
export function readChanges(store: Store, key: string): Change[] {
  const text = store.getItem(key)
  if (text === null) return []
  try {
    const parsed = z.array(z.unknown()).safeParse(JSON.parse(text))
    if (!parsed.success) return []
    // One spoilt entry must not take the others with it.
    return parsed.data.flatMap((entry) => {
      const change = changeSchema.safeParse(entry)
      return change.success ? [change.data] : []
    })
  } catch {
    return []
  }
}
