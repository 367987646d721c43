interface ScannedPicture {
  width: number | null
  pixelsPerMm: number | null
}

/**
 * Widths in percent of equal panes that draw all pictures at one physical scale, the widest filling its pane.
 * Null when any picture's scale is unknown: sizes must then not be compared.
 */
export function physicalWidths(pictures: readonly ScannedPicture[]): number[] | null {
  const millimetres: number[] = []
  for (const { width, pixelsPerMm } of pictures) {
    if (width === null || pixelsPerMm === null || pixelsPerMm <= 0) return null
    millimetres.push(width / pixelsPerMm)
  }
  const widest = Math.max(...millimetres)
  return millimetres.map((width) => (100 * width) / widest)
}
