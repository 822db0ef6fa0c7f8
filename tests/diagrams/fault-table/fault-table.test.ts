import { describe, expect, it } from 'vitest'
import { faultTable, type TablePart } from '@/diagrams/fault-table/fault-table'
import { looksSame, resolutionAt, type Cell } from '@/diagrams/fault-table/meter-resolution'
import { mostCombinations, namedConditions } from '@/diagrams/fault-table/named-conditions'
import { probeOf } from '@/diagrams/fault-table/table-columns'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { sitesOf } from '@/diagrams/document/sites'
import { samples } from '@/diagrams/samples/all-samples'
import { measure } from '@/diagrams/solver/meter'
import { madeCircuit, onOff, whenOn } from '@/tests/support/made-circuit'
import { randomCircuit } from '@/tests/support/random-circuit'
import { seededRandom } from '@/tests/support/random'

type Head = Extract<TablePart, { part: 'head' }>

function whole(circuit: Circuit) {
  const parts = [...faultTable(circuit)]
  const head = parts[0] as Head
  const rows = parts.filter((part) => part.part === 'row')
  const last = parts.at(-1)
  if (last?.part !== 'alike') throw new Error('the table does not end with what looks alike')
  return { head, rows, alike: last.sets }
}

/** What `measure` shows for a cell, or null where it refuses because nothing comes to rest. */
function measured(circuit: Circuit, { head, rows }: ReturnType<typeof whole>, row: number, column: number) {
  const { condition, fault } = rows[row]!
  const probe = probeOf(head.columns[column]!, head.conditions[condition]!.condition)
  if (!probe) return null
  const shown = measure(circuit, probe, head.faults[fault] ?? undefined)
  return shown.ok ? shown.value : null
}

describe('the fault table', () => {
  it('has a row for every fault of every place in every condition, the good circuit first', () => {
    for (const circuit of samples.slice(0, 4)) {
      const { head, rows } = whole(circuit)
      expect(rows.length).toBe(head.faults.length * head.conditions.length)
      expect(head.faults[0]).toBeNull()
      const listed = new Set(head.faults.flatMap((fault) => (fault ? [`${fault.site} ${fault.mode}`] : [])))
      const wanted = sitesOf(circuit).flatMap(({ id, modes }) => modes.map((mode) => `${id} ${mode}`))
      expect([...listed].toSorted()).toEqual(wanted.toSorted())
      for (const row of rows) expect(row.cells.length).toBe(head.columns.length)
    }
  })

  it('holds what the meter shows, in cells picked all over samples and random circuits', () => {
    const random = seededRandom(11)
    const circuits = [...samples, randomCircuit(22), randomCircuit(23), randomCircuit(24)]
    let compared = 0
    for (const circuit of circuits) {
      const table = whole(circuit)
      for (let i = 0; i < 40; i++) {
        const row = random.whole(0, table.rows.length - 1)
        const column = random.whole(0, table.head.columns.length - 1)
        const cell = table.rows[row]!.cells[column]!
        const shown = measured(circuit, table, row, column)
        const what = `${circuit.title} ${JSON.stringify(table.head.columns[column])} ${JSON.stringify(table.rows[row]!.fault)}`
        if (typeof cell === 'number' && typeof shown === 'number')
          expect(Math.abs(cell - shown), what).toBeLessThanOrEqual(1e-9 + 1e-9 * Math.abs(shown))
        else expect(cell, what).toEqual(shown)
        compared++
      }
    }
    expect(compared).toBe(40 * circuits.length)
  })

  it('tells two faults apart exactly where some cell differs by more than the meter shows, or others join them', () => {
    for (const circuit of [...samples.slice(0, 5), randomCircuit(23)]) {
      const { head, rows, alike } = whole(circuit)
      const cellsOf = head.faults.map((_, f) => rows.filter((row) => row.fault === f))
      const setOf = new Map(alike.flatMap((set, i) => set.map((fault) => [fault, i] as const)))
      const kind = (condition: number) => (head.conditions[condition]!.condition.battery ? 'volts' : 'ohms')
      const differ = (a: number, b: number) =>
        cellsOf[a]!.some((row, r) =>
          row.cells.some((cell, c) => !looksSame(kind(row.condition), cell, cellsOf[b]![r]!.cells[c]!)),
        )
      for (let a = 0; a < head.faults.length; a++)
        for (let b = a + 1; b < head.faults.length; b++) {
          const together = setOf.has(a) && setOf.get(a) === setOf.get(b)
          // No pair that no cell tells apart is ever split.
          if (!together) expect(differ(a, b), `${circuit.title} ${a} ${b}`).toBe(true)
        }
      for (const set of alike) {
        // Each member looks like another one of its set: nobody is in it for nothing.
        for (const a of set)
          expect(
            set.some((b) => a !== b && !differ(a, b)),
            `${circuit.title} ${a}`,
          ).toBe(true)
      }
    }
  })

  it('names a contact and the wire behind it alike when both are open', () => {
    const { head, alike } = whole(samples[0]!)
    const names = alike.map((set) => set.map((f) => `${head.faults[f]?.site} ${head.faults[f]?.mode}`))
    expect(names.some((set) => set.some((one) => one.startsWith('contact:')) && set.length > 1)).toBe(true)
  })

  it('says which fuse a short has blown', () => {
    const circuit = madeCircuit(
      [
        { id: 'bat', kind: 'battery' },
        { id: 'f1', kind: 'fuse', amps: 10 },
        { id: 'lamp', kind: 'load', ohms: 6 },
        { id: 'g1', kind: 'ground' },
      ],
      ['bat.pos > f1.in', 'f1.out > lamp.a', 'lamp.b > g1.in'],
    )
    const { head, rows } = whole(circuit)
    const short = head.faults.findIndex(
      (fault) => fault?.site === 'wire:w2' && fault.mode === 'short-to-ground',
    )
    expect(rows.filter(({ fault }) => fault === short).map(({ blows }) => blows)).toEqual([['f1'], ['f1']])
  })

  it('yields row by row: the first comes before the last is worked out', () => {
    const table = faultTable(samples[7]!)
    expect(table.next().value).toMatchObject({ part: 'head' })
    expect(table.next().value).toMatchObject({ part: 'row', condition: 0, fault: 0 })
    expect(table.return().done).toBe(true)
  })
})

describe('named conditions', () => {
  it('are every combination of controls by name, then the battery off', () => {
    const circuit = madeCircuit([{ id: 'bat', kind: 'battery' }], [], {
      controls: [
        { ...onOff('key'), label: 'Key' },
        { id: 'sw', positions: ['free', 'held'], rest: 'free' },
      ],
    })
    expect(namedConditions(circuit).conditions.map(({ name }) => name)).toEqual([
      'everything at rest',
      'Key on',
      'sw held',
      'Key on, sw held',
      'battery disconnected',
    ])
    expect(namedConditions(circuit).leftOut).toBe(0)
  })

  it('past a bound are left out and counted', () => {
    const controls = Array.from({ length: 10 }, (_, i) => onOff(`k${i}`))
    const circuit = madeCircuit(
      [
        { id: 'bat', kind: 'battery' },
        { id: 'sw', kind: 'switch', contacts: [{ id: 'c', a: 'a', b: 'b', closed: whenOn('k3') }] },
      ],
      ['bat.pos > sw.a'],
      { controls },
    )
    const { conditions, leftOut } = namedConditions(circuit)
    expect(conditions.length).toBe(mostCombinations + 1)
    expect(leftOut).toBe(1024 - mostCombinations)
  })
})

describe("the meter's resolution", () => {
  it('is a hundredth of a volt, and one count of 4,000 in ohms', () => {
    expect(resolutionAt('volts', 12.6)).toBe(0.01)
    expect([0, 5, 399, 400].map((ohms) => resolutionAt('ohms', ohms))).toEqual([0.1, 0.1, 0.1, 0.1])
    expect([401, 3999, 4100, 2e6].map((ohms) => resolutionAt('ohms', ohms))).toEqual([1, 1, 10, 1000])
  })
  it.each([
    [12.6, 12.605, true],
    [12.6, 12.62, false],
    ['OL', 'OL', true],
    ['OL', 39e6, false],
    [true, false, false],
    [null, null, true],
    [null, 0, false],
  ] as [Cell, Cell, boolean][])('%s and %s', (a, b, same) => {
    expect(looksSame('volts', a, b)).toBe(same)
  })
})
