/** Keeps a pointer with the element that listens, so that a drag survives leaving it. */
export function holdPointer(event: PointerEvent): void {
  if (event.currentTarget instanceof Element) event.currentTarget.setPointerCapture(event.pointerId);
}

/** How far across the element that listens a pointer is, 0 at its left edge, 1 at its right. */
export function shareAcross(event: PointerEvent): number {
  if (!(event.currentTarget instanceof Element)) return 0;
  const box = event.currentTarget.getBoundingClientRect();
  return box.width > 0 ? (event.clientX - box.left) / box.width : 0;
}
