'use client'

import { useParams } from 'next/navigation'
import { ExportLink } from './export-link'
import { FaultTableLink } from './fault-table-link'

/** What can be saved of the circuit whose page this is; the address says which. */
export function OpenCircuitExport() {
  const params = useParams<{ circuitId?: string }>()
  if (!params?.circuitId) return null
  return (
    <div className="flex flex-wrap gap-2">
      <ExportLink circuitId={params.circuitId} />
      <FaultTableLink circuitId={params.circuitId} />
    </div>
  )
}
