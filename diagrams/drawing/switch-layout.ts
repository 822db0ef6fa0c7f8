import type { NodeOf, SwitchContact } from '../document/node-schema'

export interface SwitchPort {
  name: string
  side: 'left' | 'right'
  y: number
  /** Rows of the contacts it belongs to. */
  rows: number[]
}

export interface SwitchLayout {
  width: number
  height: number
  ports: SwitchPort[]
  contacts: { contact: SwitchContact; y: number }[]
}

const rowPixels = 40

/** One row a contact, its `a` at the left and its `b` at the right; a port of several contacts sits midway. */
export function switchLayout(node: NodeOf<'switch'>): SwitchLayout {
  const rowY = (row: number) => 40 + rowPixels * row
  const sides = new Map<string, { side: 'left' | 'right'; rows: number[] }>()
  node.contacts.forEach((contact, row) => {
    for (const [name, side] of [
      [contact.a, 'left'],
      [contact.b, 'right'],
    ] as const) {
      const known = sides.get(name)
      if (known) known.rows.push(row)
      else sides.set(name, { side, rows: [row] })
    }
  })
  const ports: SwitchPort[] = []
  for (const [name, { side, rows }] of sides) {
    const mean = rows.reduce((sum, row) => sum + rowY(row), 0) / rows.length
    let y = Math.round(mean / 20) * 20
    while (ports.some((port) => port.side === side && port.y === y)) y += 20
    ports.push({ name, side, y, rows })
  }
  const lowest = Math.max(...ports.map((port) => port.y), rowY(node.contacts.length - 1))
  return {
    width: 120,
    height: lowest + 20,
    ports,
    contacts: node.contacts.map((contact, row) => ({ contact, y: rowY(row) })),
  }
}
