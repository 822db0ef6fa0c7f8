import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query'
import {
  type CircuitPage,
  circuitPageSchema,
  type CreateCircuit,
  type StoredCircuit,
  storedCircuitSchema,
} from '@/lib/shared/api/circuits'
import { type TraceList, traceListSchema } from '@/lib/shared/api/traces'
import { type Called, callApi } from './call-api'
import { CallError } from './traces'

async function orThrow<T>(call: Promise<Called<T>>): Promise<T> {
  const called = await call
  if (!called.ok) throw new CallError(called.failure)
  return called.value
}

/** `query`: the finders as a search string, without a cursor. */
export function circuitsQuery(query: string) {
  return infiniteQueryOptions({
    queryKey: ['circuits', query],
    queryFn: ({ pageParam }) => {
      const params = new URLSearchParams(query)
      if (pageParam !== null) params.set('cursor', pageParam)
      return orThrow<CircuitPage>(callApi('GET', `circuits?${params}`, circuitPageSchema))
    },
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
  })
}

export function allOpenTracesQuery() {
  return queryOptions({
    queryKey: ['traces', 'open'],
    queryFn: () => orThrow<TraceList>(callApi('GET', 'traces?open=1', traceListSchema)),
  })
}

export function createCircuit(circuit: CreateCircuit): Promise<Called<StoredCircuit>> {
  return callApi('POST', 'circuits', storedCircuitSchema, circuit)
}
