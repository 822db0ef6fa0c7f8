import { z } from 'zod'
import { circuitSchema } from './circuit-schema'

/** The circuit document as JSON Schema (2020-12), for what a file may hold before defaults are filled in. */
export function circuitJsonSchema(): object {
  return z.toJSONSchema(circuitSchema, { io: 'input' })
}
