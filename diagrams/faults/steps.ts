/** How far a long piece of work has come. */
export interface Step {
  stage: 'circuit' | 'readings' | 'planning'
  done: number
  of: number
}

/**
 * Work in portions: between two of them whoever runs it may look for something newer to do, and leave. There is no clock
 * in here; how long a portion may take is for the runner to say, by how many it takes at once.
 */
export type Steps<T> = Generator<Step, T, void>

/** The same work at one go. */
export function runToEnd<T>(steps: Steps<T>): T {
  for (;;) {
    const next = steps.next()
    if (next.done) return next.value
  }
}
