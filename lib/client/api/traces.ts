import { queryOptions } from '@tanstack/react-query'
import type { Reading } from '@/diagrams/document/reading-schema'
import {
  type PutFinding,
  type PutProof,
  type StartTrace,
  type Trace,
  traceListSchema,
  traceSchema,
} from '@/lib/shared/api/traces'
import { type Called, callApi, type CallFailure } from './call-api'

const at = (id: string) => `traces/${encodeURIComponent(id)}`

export function startTrace(trace: StartTrace): Promise<Called<Trace>> {
  return callApi('POST', 'traces', traceSchema, trace)
}

export function fetchTrace(id: string): Promise<Called<Trace>> {
  return callApi('GET', at(id), traceSchema)
}

/** The reading's own id stands in the address, so sending it twice does no harm. */
export function putReading(traceId: string, reading: Reading): Promise<Called<Trace>> {
  return callApi('PUT', `${at(traceId)}/readings/${reading.id}`, traceSchema, reading)
}

export function deleteReading(traceId: string, readingId: string): Promise<Called<Trace>> {
  return callApi('DELETE', `${at(traceId)}/readings/${readingId}`, traceSchema)
}

export function answerCautions(traceId: string): Promise<Called<Trace>> {
  return callApi('PUT', `${at(traceId)}/cautions`, traceSchema, {})
}

export function putFinding(traceId: string, finding: PutFinding): Promise<Called<Trace>> {
  return callApi('PUT', `${at(traceId)}/finding`, traceSchema, finding)
}

export function putProof(traceId: string, proof: PutProof): Promise<Called<Trace>> {
  return callApi('PUT', `${at(traceId)}/proof`, traceSchema, proof)
}

/** Carries the failure of a call through a query, which knows only thrown errors. */
export class CallError extends Error {
  /** Absent while trying again may help, so that the query client asks once more. */
  readonly code?: string

  constructor(readonly failure: CallFailure) {
    super(failure.message)
    if (!failure.tryAgain) this.code = failure.code
  }
}

async function orThrow<T>(call: Promise<Called<T>>): Promise<T> {
  const called = await call
  if (!called.ok) throw new CallError(called.failure)
  return called.value
}

export function traceQuery(id: string) {
  return queryOptions({ queryKey: ['trace', id], queryFn: () => orThrow(fetchTrace(id)) })
}

export function openTracesQuery(circuitId: string) {
  return queryOptions({
    queryKey: ['traces', 'open', circuitId],
    queryFn: () =>
      orThrow(callApi('GET', `traces?open=1&circuitId=${encodeURIComponent(circuitId)}`, traceListSchema)),
  })
}
