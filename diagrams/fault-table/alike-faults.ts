import { looksSame, type Cell } from './meter-resolution'

/**
 * Sets of faults that no cell seen so far tells apart, kept while cells stream by: a column splits every set where its
 * values, in order, lie further apart than the meter shows. So two faults that never differ by more than that are never
 * split, and two that have been split differ by more in some cell. Members of one set may be joined by others between
 * them. Memory: one number a fault.
 */
export class AlikeFaults {
  /** Set of each fault; equal numbers, alike so far. */
  private readonly setOf: Int32Array
  private sets = 1

  constructor(faults: number) {
    this.setOf = new Int32Array(faults)
  }

  /** One column of one condition: a cell for every fault. */
  split(kind: 'volts' | 'ohms', cells: readonly Cell[]): void {
    for (const list of this.members()) {
      if (list.length < 2) continue
      // The first piece keeps the set's number.
      for (const piece of piecesOf(list, kind, cells).slice(1)) {
        for (const fault of piece) this.setOf[fault] = this.sets
        this.sets++
      }
    }
  }

  /** Sets of two or more, in the order of their first fault. */
  alike(): number[][] {
    return this.members().filter((list) => list.length > 1)
  }

  private members(): number[][] {
    const lists = new Map<number, number[]>()
    this.setOf.forEach((set, fault) => {
      const list = lists.get(set)
      if (list) list.push(fault)
      else lists.set(set, [fault])
    })
    return [...lists.values()]
  }
}

/** Faults whose cells follow one another without a gap that the meter shows; figures in order, other cells by what they are. */
function piecesOf(list: readonly number[], kind: 'volts' | 'ohms', cells: readonly Cell[]): number[][] {
  const pieces: number[][] = []
  const others = new Map<Cell, number[]>()
  const figures = list.filter((fault) => typeof cells[fault] === 'number')
  figures.sort((a, b) => (cells[a] as number) - (cells[b] as number))
  figures.forEach((fault, i) => {
    if (i > 0 && looksSame(kind, cells[figures[i - 1]!]!, cells[fault]!)) pieces.at(-1)!.push(fault)
    else pieces.push([fault])
  })
  for (const fault of list) {
    const cell = cells[fault]!
    if (typeof cell === 'number') continue
    const same = others.get(cell)
    if (same) same.push(fault)
    else others.set(cell, [fault])
  }
  return [...pieces, ...others.values()]
}
