import { spawnSync } from 'node:child_process'
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'

/** A resistance with a source in series: volts(a) − volts(b) = volts + ohms · amperes from a to b. */
export interface DeckElement {
  name: string
  /** Net names; "0" is ground. */
  a: string
  b: string
  /** 0 is allowed: the nets are then one. */
  ohms: number
  volts?: number
}
export interface Deck {
  elements: DeckElement[]
  /** A current source: amperes put in at one net and taken out at another. */
  injected?: { into: string; outOf: string; amps: number }
}
export interface DeckAnswer {
  volts(net: string): number
  /** Through an element, from its a to its b. */
  amps(name: string): number
}

/** From here on a resistor's conductance is too small to drown its neighbours' in rounding. */
const plainFromOhms = 1e4

/**
 * Solves each deck with Debian's ngspice, all in one process, and reads the answers from its
 * binary raw file, so that nothing is lost in printing.
 *
 * Small resistances are written by their current (V = R·I: a 0 V sensor and a current-controlled
 * source) instead of as R lines. The answer is the same by Ohm's law, but the simulator then
 * holds ohms, not conductances: with 10 Msiemens beside 1e-11 siemens its double-precision
 * matrix would lose the small one altogether.
 */
export function runNgspice(decks: readonly Deck[]): DeckAnswer[] {
  const folder = mkdtempSync(path.join(tmpdir(), 'ngspice-'))
  try {
    const nets = decks.map((deck, index) => {
      const { text, netNumber } = writeDeck(deck, `deck ${index}`)
      writeFileSync(path.join(folder, `${index}.cir`), text)
      return netNumber
    })
    const lines = decks.flatMap((_, index) => [
      `source ${index}.cir`,
      'op',
      `write all.raw all`,
      'destroy all',
      'remcirc',
    ])
    writeFileSync(
      path.join(folder, 'run.sp'),
      ['* runner', '.control', 'set appendwrite', ...lines, 'quit', '.endc', '.end', ''].join('\n'),
    )
    const run = spawnSync('ngspice', ['-b', '-n', 'run.sp'], {
      cwd: folder,
      encoding: 'utf8',
      maxBuffer: 1e9,
    })
    if (run.error)
      throw new Error('ngspice does not start: install the Debian package ngspice', { cause: run.error })
    const answers = parseRaw(readFileSync(path.join(folder, 'all.raw')))
    if (answers.length !== decks.length)
      throw new Error(
        `ngspice solved ${answers.length} of ${decks.length} decks: ${run.stderr.slice(0, 2000)}`,
      )
    return answers.map((values, index) => {
      const deck = decks[index]!
      const netNumber = nets[index]!
      const place = new Map(deck.elements.map((element, i) => [element.name, i]))
      const read = (name: string): number => {
        const value = values.get(name)
        if (value === undefined || Number.isNaN(value))
          throw new Error(`deck ${index}: ngspice gave no ${name}`)
        return value
      }
      return {
        volts: (net) => (net === '0' ? 0 : read(`v(${netNumber.get(net)})`)),
        amps: (name) => {
          const i = place.get(name)!
          const element = deck.elements[i]!
          if (!isPlain(element)) return read(`i(v${i})`)
          const at = (net: string) => (net === '0' ? 0 : read(`v(${netNumber.get(net)})`))
          return (at(element.a) - at(element.b)) / element.ohms
        },
      }
    })
  } finally {
    rmSync(folder, { recursive: true, force: true })
  }
}

function isPlain(element: DeckElement): boolean {
  return element.ohms >= plainFromOhms && !element.volts
}

function writeDeck(deck: Deck, title: string): { text: string; netNumber: Map<string, number> } {
  const netNumber = new Map<string, number>()
  const net = (name: string): string => {
    if (name === '0') return '0'
    let number = netNumber.get(name)
    if (number === undefined) netNumber.set(name, (number = netNumber.size + 1))
    return String(number)
  }
  const lines = [title, '.options reltol=1e-12 abstol=1e-18 vntol=1e-15 gmin=1e-30 pivrel=0.1 pivtol=1e-25']
  deck.elements.forEach((element, i) => {
    const [a, b] = [net(element.a), net(element.b)]
    const volts = element.volts ?? 0
    if (a === b && volts === 0) return
    if (isPlain(element)) lines.push(`r${i} ${a} ${b} ${element.ohms}`)
    else if (element.ohms === 0) lines.push(`v${i} ${a} ${b} ${volts}`)
    else lines.push(`v${i} ${a} m${i} ${volts}`, `h${i} m${i} ${b} v${i} ${element.ohms}`)
  })
  if (deck.injected)
    lines.push(`i1 ${net(deck.injected.outOf)} ${net(deck.injected.into)} ${deck.injected.amps}`)
  lines.push('.end', '')
  return { text: lines.join('\n'), netNumber }
}

/** Plots of a binary raw file, each as its vectors' first values by name. */
function parseRaw(raw: Buffer): Map<string, number>[] {
  const plots: Map<string, number>[] = []
  const mark = Buffer.from('Binary:\n')
  for (let from = 0; ; ) {
    const at = raw.indexOf(mark, from)
    if (at < 0) return plots
    const names = raw
      .toString('latin1', from, at)
      .split('\n')
      .map((line) => /^\t\d+\t(\S+)\t/.exec(line)?.[1])
      .filter((name) => name !== undefined)
    let offset = at + mark.length
    const values = new Map<string, number>()
    for (const name of names) {
      values.set(name, raw.readDoubleLE(offset))
      offset += 8
    }
    plots.push(values)
    from = offset
  }
}
