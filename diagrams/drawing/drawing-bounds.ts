import { textBox } from './part-label'
import type { Box, Primitive } from './primitive'

/** The box that holds all of a drawing; an empty drawing gets a small one, so that a file of it is still valid. */
export function drawingBounds(primitives: readonly Primitive[]): Box {
  let left = Number.POSITIVE_INFINITY
  let top = Number.POSITIVE_INFINITY
  let right = Number.NEGATIVE_INFINITY
  let bottom = Number.NEGATIVE_INFINITY
  for (const one of primitives)
    for (const { x, y, width, height } of boxesOf(one)) {
      left = Math.min(left, x)
      top = Math.min(top, y)
      right = Math.max(right, x + width)
      bottom = Math.max(bottom, y + height)
    }
  if (left > right) return { x: 0, y: 0, width: 320, height: 120 }
  return {
    x: Math.floor(left),
    y: Math.floor(top),
    width: Math.ceil(right) - Math.floor(left),
    height: Math.ceil(bottom) - Math.floor(top),
  }
}

function boxesOf(one: Primitive): Box[] {
  switch (one.kind) {
    case 'text':
      return [textBox(one)]
    case 'rect':
      return [one]
    case 'circle':
      return [{ x: one.cx - one.r, y: one.cy - one.r, width: 2 * one.r, height: 2 * one.r }]
    case 'line':
      return [
        {
          x: Math.min(one.x1, one.x2),
          y: Math.min(one.y1, one.y2),
          width: Math.abs(one.x1 - one.x2),
          height: Math.abs(one.y1 - one.y2),
        },
      ]
    case 'path':
      return pathPlaces(one.d).map((place) => ({ ...place, width: 0, height: 0 }))
  }
}

/** Every place an absolute path names; curves bulge past theirs by less than the margin round a drawing. */
function pathPlaces(d: string): { x: number; y: number }[] {
  const places: { x: number; y: number }[] = []
  let x = 0
  let y = 0
  for (const [, command, rest] of d.matchAll(/([MLQHVACSZ])([^MLQHVACSZ]*)/g)) {
    const numbers = (rest ?? '').match(/-?\d+(\.\d+)?/g)?.map(Number) ?? []
    const step = command === 'A' ? 7 : command === 'H' || command === 'V' ? 1 : 2
    for (let at = 0; at + step <= numbers.length; at += step) {
      if (command === 'H') x = numbers[at] as number
      else if (command === 'V') y = numbers[at] as number
      else {
        x = numbers[at + step - 2] as number
        y = numbers[at + step - 1] as number
      }
      places.push({ x, y })
    }
  }
  return places
}
