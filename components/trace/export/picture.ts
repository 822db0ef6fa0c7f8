/** Longest side of a picture in px; larger canvases come out empty in some browsers. */
const longestPixels = 16_000
const white = 'white'
let fonts: Promise<string> | null = null

/** An element of the page as a PNG file: twice its size, on white ground, with the product's own faces in it. */
export async function pictureOf(element: HTMLElement): Promise<Blob> {
  const { getFontEmbedCSS, toBlob } = await import('html-to-image')
  await document.fonts.ready
  fonts ??= getFontEmbedCSS(element)
  const { offsetWidth: width, offsetHeight: height } = element
  const blob = await toBlob(element, {
    backgroundColor: white,
    fontEmbedCSS: await fonts,
    pixelRatio: Math.min(2, longestPixels / Math.max(width, height, 1)),
    width,
    height,
  })
  if (!blob) throw new Error(`The picture of ${width} by ${height} px could not be made`)
  return blob
}

export function saveFile(blob: Blob, name: string): void {
  const address = URL.createObjectURL(blob)
  const link = document.createElement('a')
  link.href = address
  link.download = name
  link.click()
  setTimeout(() => URL.revokeObjectURL(address), 10_000)
}

/** "rear-work-lamps-B1E42-13-2026-12-01.png" */
export function pictureName(title: string, code: string | null, date: Date): string {
  const words = title
    .toLowerCase()
    .replaceAll(/[^a-z0-9]+/g, '-')
    .replaceAll(/^-|-$/g, '')
    .slice(0, 60)
  return [words || 'circuit', code, date.toISOString().slice(0, 10)].filter(Boolean).join('-').concat('.png')
}
