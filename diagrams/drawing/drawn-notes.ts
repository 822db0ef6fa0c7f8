import type { Circuit } from '../document/circuit-schema'
import { textWidth, type Primitive } from './primitive'
import { note } from './symbol-pen'

const widestPixels = 300

/** Notes, callouts and "expect here" tags of the document: drawn, never solved. */
export function drawNotes(circuit: Circuit): Primitive[] {
  return circuit.annotations.flatMap((annotation): Primitive[] => {
    const lines = wrapText(annotation.text, widestPixels, 13)
    const words = lines.map((line, at) => note(annotation.x, annotation.y + 17 * at, line, 'start'))
    if (annotation.kind === 'note' || lines.length === 0) return words
    const width = Math.max(...lines.map((line) => textWidth(line, 13)))
    const box = {
      x: annotation.x - 8,
      y: annotation.y - 18,
      width: width + 16,
      height: 17 * lines.length + 12,
    }
    return [
      {
        kind: 'rect',
        ...box,
        radius: 3,
        fill: 'sheet',
        stroke: 'edge',
        strokeWidth: 1.5,
        ...(annotation.kind === 'expect' ? { dash: '3 3' } : {}),
      },
      ...words,
    ]
  })
}

/** Words into lines no wider than `widest`; a word that is wider stands alone. */
export function wrapText(text: string, widest: number, size: number): string[] {
  return text.split('\n').flatMap((paragraph) => {
    const lines: string[] = []
    let line = ''
    for (const word of paragraph.split(/\s+/).filter(Boolean)) {
      const longer = line ? `${line} ${word}` : word
      if (line && textWidth(longer, size) > widest) {
        lines.push(line)
        line = word
      } else line = longer
    }
    return line ? [...lines, line] : lines
  })
}
