import { textKey } from '../circuits/search-keys'
import type { Trx } from '../tables/database'

export interface Vehicle {
  id: string
  title: string
}

/**
 * The vehicle of a title, made if it is new, and locked: whoever changes its connectors or circuits waits here.
 * Without a title it is the circuit's own, shares its id, and nobody else's.
 */
export async function lockVehicle(
  trx: Trx,
  organisationId: string,
  title: string,
  { circuitId, newId }: { circuitId: string; newId: string },
): Promise<Vehicle> {
  const key = textKey(title)
  const id = key === '' ? circuitId : newId
  await trx
    .insertInto('vehicles')
    .values({ organisation_id: organisationId, id, title: title.trim(), title_key: key })
    .onConflict((conflict) => conflict.doNothing())
    .execute()
  return trx
    .selectFrom('vehicles')
    .select(['id', 'title'])
    .where('organisation_id', '=', organisationId)
    .where((is) => (key === '' ? is('id', '=', id) : is('title_key', '=', key)))
    .forUpdate()
    .executeTakeFirstOrThrow()
}
