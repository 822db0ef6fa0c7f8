import type { Probe, ReadingValue } from '../document/reading-schema'

/** A reading that would have been wrong with the fault in, and shows that it is gone. */
export interface ConfirmingReading {
  probe: Probe
  /** What the good circuit shows. */
  expected: ReadingValue
  /** What the fault would show; null where it is taken to be safe, not to tell. */
  withFault: ReadingValue | null
  /** Why it is taken: before a new fuse goes in, under load, the job itself, or one that was wrong before. */
  proves: 'cause-gone' | 'under-load' | 'job-done' | 'was-wrong'
  /** Number of the reading it repeats, from 0. */
  repeats?: number
  says: string
}
