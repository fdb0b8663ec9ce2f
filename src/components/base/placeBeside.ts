const gap_px = 4

/** Puts a floating box under its anchor, or above it where there is no room, and keeps it inside the window. */
export function placeBeside(anchor: HTMLElement, box: HTMLElement): void {
  const at = anchor.getBoundingClientRect()
  const size = box.getBoundingClientRect()
  const below = at.bottom + gap_px
  const fitsBelow = below + size.height <= window.innerHeight
  const left = Math.max(gap_px, Math.min(at.left, window.innerWidth - size.width - gap_px))
  box.style.top = `${fitsBelow ? below : Math.max(gap_px, at.top - gap_px - size.height)}px`
  box.style.left = `${left}px`
}
