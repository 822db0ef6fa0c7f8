import { Kysely, PostgresDialect, sql } from 'kysely'
import pg from 'pg'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Tables } from '@/db/tables/database'
import { withOrganisation } from '@/db/with-organisation'
import { createCircuit } from '@/lib/server/use-cases/circuits/create-circuit'
import { searchCircuits } from '@/lib/server/use-cases/circuits/search-circuits'
import { getCavity } from '@/lib/server/use-cases/connectors/get-cavity'
import { listTraces } from '@/lib/server/use-cases/traces/list-traces'
import { exampleCircuit } from '../app/support/example'
import { makeShop, type Shop } from '../app/support/shop'
import { withDatabase } from '../support/database'

interface Sent {
  sql: string
  parameters: readonly unknown[]
}

// Plans of the very statements that the use cases send, under the application's role and row-level security, over
// 5,000 circuits: on so many rows the planner takes an index because it is better, not because it was told to. What is
// searched for is rare among them, so that no estimate from a sample of the rows comes near the cost of reading all.
describe('the plans of the searches', () => {
  const database = withDatabase<Tables>()
  let shop: Shop
  let listening: Kysely<Tables>
  let sent: Sent[] = []
  let vehicleId = ''

  beforeAll(async () => {
    shop = await makeShop(database, 'Large shop')
    const { context } = shop.people.owner
    const made = await createCircuit(context, { document: exampleCircuit() })
    if (!made.ok) throw new Error(made.failure.message)
    vehicleId = made.value.vehicleId
    await multiply(made.value.id, 5_000)
    const pool = new pg.Pool({ connectionString: database.appUrl, max: 2 })
    listening = new Kysely<Tables>({
      dialect: new PostgresDialect({ pool }),
      log: (event) => {
        if (event.level === 'query') sent.push(event.query)
      },
    })
  }, 120_000)
  afterAll(() => listening.destroy())

  /** Copies one circuit's rows, each copy with a code, words and colours of its own. */
  async function multiply(id: string, times: number) {
    await withOrganisation(database.owner, shop.organisationId, async (trx) => {
      await sql`create temp table copies on commit drop as
        select gen_random_uuid() as id, n from generate_series(1, ${sql.lit(times)}) as n`.execute(trx)
      await sql`insert into circuits select organisation_id, k.id, vehicle_id, title || k.n, title_key || k.n, vehicle,
        'System ' || k.n % 40, 1, rest, created_by, saved_by, created_at, updated_at from circuits c, copies k where c.id = ${id}`.execute(
        trx,
      )
      await sql`insert into circuit_revisions select organisation_id, k.id, revision, document, saved_by, saved_at
        from circuit_revisions c, copies k where c.circuit_id = ${id}`.execute(trx)
      await sql`insert into circuit_nodes select organisation_id, k.id, c.id, position, kind, label, connector, rest
        from circuit_nodes c, copies k where c.circuit_id = ${id}`.execute(trx)
      await sql`insert into circuit_wires select organisation_id, k.id, c.id, position, from_node, from_port, to_node, to_port,
        colour, signal, mm2, rest from circuit_wires c, copies k where c.circuit_id = ${id}`.execute(trx)
      await sql`insert into circuit_cavities select organisation_id, k.id, node, port, vehicle_id, 'x' || k.n, number, name
        from circuit_cavities c, copies k where c.circuit_id = ${id}`.execute(trx)
      await sql`insert into circuit_places select organisation_id, k.id, wire, side, connector, 'x' || k.n || connector_key,
        1 + (k.n * 7) % 900, colour_base || k.n % 300, colour_stripe, carries from circuit_places c, copies k where c.circuit_id = ${id}`.execute(
        trx,
      )
      await sql`insert into circuit_codes select organisation_id, k.id, position, code, failure_type, 'U' || k.n, rest
        from circuit_codes c, copies k where c.circuit_id = ${id}`.execute(trx)
      await sql`insert into circuit_words select organisation_id, k.id, word || k.n from circuit_words c, copies k
        where c.circuit_id = ${id}`.execute(trx)
      await sql`insert into traces select organisation_id, k.id, k.id, 1, created_by, '', '', '[]', null,
        case when n % 100 = 0 then 'open' else 'done' end, updated_at, updated_at
        from circuits c join copies k on k.id = c.id`.execute(trx)
      await sql`insert into trace_findings select organisation_id, id, 'contact:c7-2', 'open', '', true, started_by, started_at
        from traces where state = 'done'`.execute(trx)
    })
    await sql`analyze`.execute(database.owner)
  }

  /** Runs the work, then asks for the plan of the query it sent that reads `table`. */
  async function planOf(
    work: (context: Shop['people']['owner']['context']) => Promise<unknown>,
    pick: RegExp,
  ) {
    sent = []
    await work({ ...shop.people.owner.context, db: listening })
    const query = sent.find((candidate) => pick.test(candidate.sql))
    if (!query) throw new Error(`nothing sent fits ${pick}: ${sent.map((s) => s.sql).join('\n')}`)
    const client = new pg.Client({ connectionString: database.appUrl })
    await client.connect()
    try {
      await client.query('begin')
      await client.query("select set_config('halfsplit.organisation', $1, true)", [shop.organisationId])
      const { rows } = await client.query<{ 'QUERY PLAN': string }>(`explain ${query.sql}`, [
        ...query.parameters,
      ])
      return rows.map((row) => row['QUERY PLAN']).join('\n')
    } finally {
      await client.end()
    }
  }
  const search = (finders: Record<string, string>) => (context: Shop['people']['owner']['context']) =>
    searchCircuits(context, finders)
  type Work = (context: Shop['people']['owner']['context']) => Promise<unknown>
  const cases: [string, Work, RegExp, RegExp][] = [
    ['name', search({ name: 'request1712' }), /limit/, /circuit_words_pkey.*\n.*Index Cond: .*word >= /],
    ['code', search({ code: 'U1234' }), /limit/, /circuit_codes_by_code.*\n.*Index Cond: .*code_key >= /],
    ['system', search({ system: 'System 7' }), /limit/, /circuits_by_system.*\n.*Index Cond: .*system = /],
    ['title order', search({}), /limit/, /circuits_by_title/],
    [
      'connector',
      search({ connector: 'x1712c' }),
      /limit/,
      /circuit_places_by_connector.*\n.*Index Cond: .*connector_key >= /,
    ],
    ['cavity', search({ cavity: '17' }), /limit/, /circuit_places_by_number.*\n.*Index Cond: .*number = /],
    [
      'colour',
      search({ colour: 'GN17/YE' }),
      /limit/,
      /circuit_places_by_colour.*\n.*Index Cond: .*colour_base = /,
    ],
    [
      'what a cavity carries',
      (context) => getCavity(context, { vehicleId, connectorId: 'c7', n: '2' }),
      /circuit_cavities/,
      /circuit_cavities_by_number.*\n.*Index Cond: .*number = /,
    ],
    [
      'open traces',
      (context) => listTraces(context, { open: '1' }),
      /"traces"/,
      /traces_by_state.*\n.*Index Cond: .*state = /,
    ],
    [
      'what was found lately',
      (context) => listTraces(context, { open: '1' }),
      /trace_findings/,
      /Limit[^]*traces_by_state[^]*Index Cond: .*state = /,
    ],
  ]
  for (const [name, work, pick, index] of cases)
    it(`uses its index: ${name}`, async () => {
      const plan = await planOf(work, pick)
      expect(plan).toMatch(index)
      expect(plan).not.toMatch(/Seq Scan on (circuits|circuit_|traces)/)
    })
})
