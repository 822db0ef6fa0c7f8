import { z } from 'zod'

const uuid = z.uuid()

/** An id that cannot be one is answered like one that is not there. */
export function isId(text: string): boolean {
  return uuid.safeParse(text).success
}
