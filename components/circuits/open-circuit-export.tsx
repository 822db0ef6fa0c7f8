'use client'

import { useParams } from 'next/navigation'
import { ExportLink } from './export-link'

/** The export of the circuit whose page this is; the address says which. */
export function OpenCircuitExport() {
  const params = useParams<{ circuitId?: string }>()
  return params?.circuitId ? <ExportLink circuitId={params.circuitId} /> : null
}
