import { planNext } from '../plan-next'
import type { Policy } from './policy'

/** The planner itself: most bits per minute, one step ahead. */
export const bestSplit: Policy = ({ model, posterior, readings }) =>
  planNext(model, posterior, readings).next[0]?.probe ?? null
