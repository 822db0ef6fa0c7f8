import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { create, lusolveDependencies, sluDependencies, SparseMatrixDependencies, type Matrix } from 'mathjs'
import type { SettledNetlist } from '@/diagrams/solver/settled-netlist'

const math = create({ ...lusolveDependencies, ...sluDependencies, ...SparseMatrixDependencies })
/** Left out of the package's types; the data are those of its documentation. */
const { SparseMatrix } = math as unknown as { SparseMatrix: new (data: object) => Matrix }

/** Nodal equations of a netlist as a compressed sparse matrix and a right side, chassis left out. */
export function assemble({ nets, elements }: SettledNetlist) {
  const size = nets - 1
  const columns = Array.from({ length: size }, () => new Map<number, number>())
  const right = new Array<number>(size).fill(0)
  const add = (i: number, j: number, value: number) => {
    if (i > 0 && j > 0) columns[j - 1]!.set(i - 1, (columns[j - 1]!.get(i - 1) ?? 0) + value)
  }
  for (const { a, b, ohms, volts } of elements) {
    const g = 1 / ohms
    add(a, a, g)
    add(b, b, g)
    add(a, b, -g)
    add(b, a, -g)
    if (a > 0) right[a - 1]! += g * volts
    if (b > 0) right[b - 1]! -= g * volts
  }
  const values: number[] = []
  const index: number[] = []
  const ptr = [0]
  for (const column of columns) {
    for (const [row, value] of [...column].toSorted(([x], [y]) => x - y)) {
      index.push(row)
      values.push(value)
    }
    ptr.push(values.length)
  }
  return { size, values, index, ptr, right }
}

/** Volts per net by the sparse LU of mathjs, ordered by minimum degree (its order 1), from equations made anew. */
export function solveBySparseLu(netlist: SettledNetlist): number[] {
  const { size, values, index, ptr, right } = assemble(netlist)
  const matrix = new SparseMatrix({
    values,
    index,
    ptr,
    size: [size, size],
    datatype: 'number',
  })
  const solved = math.lusolve(math.slu(matrix, 1, 0.001), right) as Matrix
  return [0, ...(solved.valueOf() as number[][]).map((row) => Number(row[0]))]
}

/**
 * Processor seconds that ngspice takes for a `.dc` sweep of one resistor over so many values, a few
 * nets kept. The time of the same deck with two values is taken off: start and reading cost every
 * solver alike.
 */
export function ngspiceSweepSeconds(
  netlist: SettledNetlist,
  swept: string,
  ohms: readonly [number, number],
  points: number,
  keep: readonly number[],
): number {
  const time = (count: number) => {
    const folder = mkdtempSync(path.join(tmpdir(), 'ngspice-'))
    try {
      const at = netlist.elements.findIndex((element) => element.name === swept)
      const lines = netlist.elements.flatMap(({ a, b, ohms: own, volts }, i) => {
        if (a === b) return []
        if (volts === 0) return [`r${i} ${a} ${b} ${own}`]
        return [`v${i} ${a} m${i} ${volts}`, `r${i} m${i} ${b} ${own}`]
      })
      const step = (ohms[1] - ohms[0]) / (count - 1)
      const deck = [
        'sweep',
        '.options gmin=1e-15',
        ...lines,
        `.save ${keep.map((net) => `v(${net})`).join(' ')}`,
        `.dc r${at} ${ohms[0]} ${ohms[1]} ${step}`,
        '.end',
        '',
      ]
      writeFileSync(path.join(folder, 'sweep.cir'), deck.join('\n'))
      const run = spawnSync(
        'bash',
        ['-c', "TIMEFORMAT='%U %S'; time ngspice -b -n -r out.raw sweep.cir > log"],
        {
          cwd: folder,
          encoding: 'utf8',
        },
      )
      const figures = /^([\d.]+) ([\d.]+)$/m.exec(run.stderr)
      if (!figures) throw new Error(`ngspice did not run: ${run.stderr.slice(0, 500)}`)
      return Number(figures[1]) + Number(figures[2])
    } finally {
      rmSync(folder, { recursive: true, force: true })
    }
  }
  return Math.max(0, time(points) - time(2))
}
