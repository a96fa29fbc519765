/**
 * A custom colour as the browser resolves it now ("rgb(31, 78, 121)"), for a canvas, which can't read custom properties. Asked
 * of an element without a box, so that `light-dark()`, system colours and the page's own inks all count.
 */
export function inkOf(swatch: HTMLElement, name: string): string {
  swatch.style.color = `var(${name})`;
  return getComputedStyle(swatch).color;
}

/** Red, green and blue, 0 to 255, of a resolved colour. */
export function inkBytes(color: string): readonly [number, number, number] {
  const [r = 0, g = 0, b = 0] = (color.match(/[\d.]+/g) ?? []).map(Number);
  return [r, g, b];
}
