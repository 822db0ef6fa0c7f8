import { type ConfirmedFinding, listConfirmedFindings } from '@/db/queries/confirmed-findings'
import type { Trx } from '@/db/tables/database'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { sitesOf } from '@/diagrams/document/sites'
import type { Odds } from '@/diagrams/faults/odds-schema'
import { classOfSite } from '@/diagrams/faults/part-class'
import { updateOdds } from '@/diagrams/faults/update-odds'

/** Traces that an organisation's odds look back on: enough to outweigh the trade's table, and recent. */
const mostTraces = 500

/** What an organisation found and proved, for the odds of its next traces. */
export function organisationFindings(
  trx: Trx,
  organisationId: string,
  except?: string,
): Promise<ConfirmedFinding[]> {
  return listConfirmedFindings(trx, organisationId, {
    most: mostTraces,
    ...(except === undefined ? {} : { except }),
  })
}

/**
 * The odds of an organisation for a circuit: how often each class of places failed in any of its circuits, and which
 * places failed in this one. Null while nothing has been found. A place that the document no longer has, or that
 * cannot fail so any more, counts for its class alone.
 */
export function organisationOdds(
  findings: readonly ConfirmedFinding[],
  circuit: { id: string; document: Circuit } | null,
): Odds | null {
  if (findings.length === 0) return null
  const modesOf = new Map(circuit ? sitesOf(circuit.document).map((site) => [site.id, site.modes]) : [])
  return updateOdds(
    { classes: {}, sites: {} },
    findings.flatMap(({ circuit_id, site, mode, kind, count }) => {
      const name = classOfSite(site, () => kind ?? undefined)
      if (name === null) return []
      const here = circuit_id === circuit?.id && modesOf.get(site)?.includes(mode)
      return [{ class: name, mode, count, ...(here ? { site } : {}) }]
    }),
  )
}
