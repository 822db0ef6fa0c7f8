import { notFound } from 'next/navigation'
import type { ReactNode } from 'react'
import { currentContext } from '@/lib/server/http/session'
import { hasCircuit } from '@/lib/server/use-cases/circuits/has-circuit'

/**
 * Answers 404 before anything is sent: a layout stands outside the loading state beside it, and once that state has
 * gone out with 200 a page can no longer take it back.
 */
export default async function CircuitLayout({
  params,
  children,
}: {
  params: Promise<{ circuitId: string }>
  children: ReactNode
}) {
  const { circuitId } = await params
  // The layout around this one leads whoever is signed out to the sign-in.
  const context = await currentContext()
  if (context && !(await hasCircuit(context, { id: circuitId }))) notFound()
  return children
}
