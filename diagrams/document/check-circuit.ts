import type { Circuit } from './circuit-schema'
import type { When } from './names'
import { parsePoint } from './points'
import { hasContact, portsOf } from './ports'
import { sitesOf } from './sites'

export interface Problem {
  /** Where in the document, as in `nodes.3.kind`; empty for the document itself. */
  path: string
  /** One plain sentence. */
  message: string
}

/** What a document that has the right shape still gets wrong: references, doubles and bounds. Empty when sound. */
export function checkCircuit(circuit: Circuit): Problem[] {
  const problems: Problem[] = []
  const report = (path: string, message: string) => problems.push({ path, message })

  const doubles = (
    what: string,
    entries: { id: string }[],
    path: string,
    taken = new Map<string, string>(),
  ) => {
    entries.forEach((entry, index) => {
      const before = taken.get(entry.id)
      if (before) report(`${path}.${index}.id`, `${what} "${entry.id}": the id is already used by ${before}`)
      else taken.set(entry.id, `${path}.${index}`)
    })
    return taken
  }
  doubles('node', circuit.nodes, 'nodes', doubles('connector', circuit.connectors, 'connectors'))
  doubles('wire', circuit.wires, 'wires')
  doubles('control', circuit.controls, 'controls')
  doubles('step', circuit.sequence, 'sequence')
  doubles('annotation', circuit.annotations, 'annotations')

  const connectors = new Map(circuit.connectors.map((c) => [c.id, c]))
  const controls = new Map(circuit.controls.map((c) => [c.id, c]))
  circuit.controls.forEach((control, index) => {
    if (new Set(control.positions).size !== control.positions.length)
      report(`controls.${index}.positions`, `control "${control.id}": a position is listed twice`)
    if (!control.positions.includes(control.rest))
      report(
        `controls.${index}.rest`,
        `control "${control.id}": rest "${control.rest}" is not one of its positions`,
      )
  })
  const checkWhen = (when: When, path: string) => {
    if (typeof when === 'string') return
    const control = controls.get(when.control)
    if (!control) return report(`${path}.control`, `control "${when.control}" does not exist`)
    when.positions.forEach((position, index) => {
      if (!control.positions.includes(position))
        report(`${path}.positions.${index}`, `control "${when.control}" has no position "${position}"`)
    })
  }
  const checkSetting = (setting: Record<string, string>, path: string) => {
    for (const [id, position] of Object.entries(setting)) {
      const control = controls.get(id)
      if (!control) report(`${path}.${id}`, `control "${id}" does not exist`)
      else if (!control.positions.includes(position))
        report(`${path}.${id}`, `control "${id}" has no position "${position}"`)
    }
  }

  const ends = new Set<string>()
  const points = new Set<string>()
  const cavityTaken = new Map<string, string>()
  circuit.nodes.forEach((node, index) => {
    const path = `nodes.${index}`
    if (node.connector !== undefined && !connectors.has(node.connector))
      report(`${path}.connector`, `node "${node.id}": connector "${node.connector}" does not exist`)
    const ports = portsOf(node)
    const names = new Set<string>()
    for (const port of ports) {
      if (names.has(port.name))
        report(`${path}.pins`, `node "${node.id}": pin "${port.name}" is listed twice`)
      names.add(port.name)
      ends.add(`${node.id}.${port.name}`)
      points.add(`${node.id}.${port.name}`)
      if (hasContact(node, port)) points.add(`${node.id}.${port.name}:part`)
      const connector = port.connector === null ? undefined : connectors.get(port.connector)
      if (connector && port.cavity !== null) {
        if (connector.cavities !== null && port.cavity > connector.cavities)
          report(
            cavityPath(node, path, port.name),
            `node "${node.id}": cavity ${port.cavity} is outside connector "${connector.id}", which has ${connector.cavities}`,
          )
        if (node.kind !== 'cavity' || port.name === 'a') {
          const key = `${connector.id} ${port.cavity} ${node.kind === 'cavity' ? 'inline' : 'part'}`
          const before = cavityTaken.get(key)
          if (before)
            report(
              cavityPath(node, path, port.name),
              `node "${node.id}": cavity ${port.cavity} of connector "${connector.id}" is already used by "${before}"`,
            )
          else cavityTaken.set(key, node.id)
        }
      }
    }
    for (const name of Object.keys(node.cavities ?? {}))
      if (!names.has(name)) report(`${path}.cavities.${name}`, `node "${node.id}" has no port "${name}"`)
    if (node.kind === 'feed') checkWhen(node.live, `${path}.live`)
    if (node.kind === 'switch') {
      doubles('contact', node.contacts, `${path}.contacts`)
      node.contacts.forEach((contact, at) => {
        checkWhen(contact.closed, `${path}.contacts.${at}.closed`)
        if (contact.a === contact.b)
          report(`${path}.contacts.${at}.b`, `contact "${contact.id}": both of its ports are "${contact.a}"`)
      })
    }
    if (node.kind === 'module') {
      node.pins.forEach((pin, at) => {
        const pinPath = `${path}.pins.${at}`
        if (pin.connector !== undefined && !connectors.has(pin.connector))
          report(`${pinPath}.connector`, `pin "${pin.pin}": connector "${pin.connector}" does not exist`)
        const inner = pin.circuit
        if ('on' in inner) checkWhen(inner.on, `${pinPath}.circuit.on`)
        if (inner.type === 'bridge' && (!names.has(inner.to) || inner.to === pin.pin))
          report(
            `${pinPath}.circuit.to`,
            `pin "${pin.pin}": bridge to "${inner.to}", expected another pin of "${node.id}"`,
          )
        if (inner.type === 'high-side') {
          const from = node.pins.find((other) =>
            inner.from === undefined ? other.circuit.type === 'supply' : other.pin === inner.from,
          )
          if (from?.circuit.type !== 'supply')
            report(
              `${pinPath}.circuit.from`,
              inner.from === undefined
                ? `pin "${pin.pin}": a high-side driver needs a supply pin in "${node.id}"`
                : `pin "${pin.pin}": "${inner.from}" is not a supply pin of "${node.id}"`,
            )
        }
      })
    }
  })

  circuit.wires.forEach((wire, index) => {
    for (const side of ['from', 'to'] as const)
      if (!ends.has(wire[side]))
        report(`wires.${index}.${side}`, `wire "${wire.id}": ${describeMissing(circuit, wire[side])}`)
    if (wire.from === wire.to) report(`wires.${index}.to`, `wire "${wire.id}": both ends are ${wire.from}`)
  })
  circuit.sequence.forEach((step, index) => checkSetting(step.controls, `sequence.${index}.controls`))
  circuit.annotations.forEach((annotation, index) => {
    if (annotation.point !== undefined && annotation.point !== 'chassis' && !points.has(annotation.point))
      report(
        `annotations.${index}.point`,
        `annotation "${annotation.id}": point ${annotation.point} does not exist`,
      )
    checkSetting(annotation.controls ?? {}, `annotations.${index}.controls`)
  })
  if (circuit.codes.some((code) => code.sites.length > 0) && problems.length === 0) {
    const sites = new Set(sitesOf(circuit).map((site) => site.id))
    circuit.codes.forEach((code, index) =>
      code.sites.forEach((site, at) => {
        if (!sites.has(site))
          report(`codes.${index}.sites.${at}`, `code "${code.code}": place "${site}" does not exist`)
      }),
    )
  }
  return problems
}

function cavityPath(node: Circuit['nodes'][number], path: string, port: string): string {
  if (node.kind === 'cavity') return `${path}.number`
  if (node.kind === 'module') return `${path}.pins.${node.pins.findIndex((pin) => pin.pin === port)}.cavity`
  return `${path}.cavities.${port}`
}

function describeMissing(circuit: Circuit, end: string): string {
  const point = parsePoint(end)
  const node = circuit.nodes.find((n) => n.id === point?.node)
  return node ? `"${node.id}" has no port "${point?.port}"` : `node "${point?.node}" does not exist`
}
