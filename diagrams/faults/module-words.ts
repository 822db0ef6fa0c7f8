import type { Circuit } from '../document/circuit-schema'
import type { ModulePin } from '../document/pin-circuit-schema'
import { nodeName } from '../document/points'
import { splitEnd } from '../document/ports'
import type { SiteAnswer } from './answer'
import { fewWords, listWords } from './value-words'

const groups: readonly { name: string; types: readonly ModulePin['circuit']['type'][] }[] = [
  { name: 'feeds', types: ['supply'] },
  { name: 'grounds', types: ['ground'] },
  { name: 'inputs', types: ['pull-up', 'pull-down'] },
  { name: 'outputs', types: ['low-side', 'high-side', 'source'] },
]

/**
 * What stands between a verdict on a module and its renewal: "Before replacing M2: feeds and grounds are proved
 * good; pin 9 is still in question." Empty when no place of a module is held to be at fault.
 */
export function moduleWords(circuit: Circuit, sites: readonly SiteAnswer[]): string {
  const faulty = sites.find((site) => site.verdict === 'faulty' && /^(pin|module):/.test(site.site))
  if (!faulty) return ''
  const id = splitEnd(`${faulty.site.slice(faulty.site.indexOf(':') + 1)}.`).node
  const module = circuit.nodes.find((node) => node.id === id)
  if (module?.kind !== 'module') return ''
  const verdicts = new Map(sites.map((site) => [site.site, site.verdict]))
  const others = module.pins.flatMap((pin) => {
    const verdict = verdicts.get(`pin:${id}.${pin.pin}`)
    return verdict === undefined || verdict === 'faulty' ? [] : [{ pin, verdict }]
  })
  const good = groups.filter(({ types }) => {
    const pins = others.filter(({ pin }) => types.includes(pin.circuit.type))
    return pins.length > 0 && pins.every(({ verdict }) => verdict === 'proved-good')
  })
  const open = others.filter(({ verdict }) => verdict === 'in-question').map(({ pin }) => pin.pin)
  const said = [
    good.length > 0 ? `${listWords(good.map(({ name }) => name))} are proved good` : '',
    open.length > 0
      ? `${open.length === 1 ? 'pin' : 'pins'} ${fewWords(open, 4)} ${open.length === 1 ? 'is' : 'are'} still in question`
      : '',
  ].filter(Boolean)
  return `Before replacing ${nodeName(module)}: ${said.join('; ') || 'prove its feeds and grounds'}.`
}
