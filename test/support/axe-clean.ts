import axe from 'axe-core';

/** What axe finds in an element under both schemes; empty where nothing. One line a node. */
export async function axeFindings(element: HTMLElement): Promise<string[]> {
  const found: string[] = [];
  for (const scheme of ['light', 'dark']) {
    element.setAttribute('scheme', scheme);
    // Nothing moves, but styles must have been applied.
    await new Promise(requestAnimationFrame);
    const { violations } = await axe.run(element, { resultTypes: ['violations'] });
    for (const { id, nodes } of violations)
      for (const node of nodes)
        found.push(`${scheme} ${id}: ${String(node.target)} ${node.failureSummary ?? ''}`);
  }
  element.removeAttribute('scheme');
  return found;
}

/** Puts a fresh element on an otherwise empty page. */
export async function show<Shown extends HTMLElement & { readonly updateComplete: Promise<boolean> }>(
  element: Shown,
  properties: Partial<Shown>,
): Promise<Shown> {
  document.body.replaceChildren();
  Object.assign(element, properties);
  document.body.append(element);
  await settled(element);
  return element;
}

/** Waits until an element has drawn what it measured, two pictures later. */
export async function settled(element: { readonly updateComplete: Promise<boolean> }): Promise<void> {
  for (let i = 0; i < 3; i++) {
    await element.updateComplete;
    await new Promise(requestAnimationFrame);
  }
}

/** The details of every event of a kind from now on. */
export function heard(element: HTMLElement, type: string): unknown[] {
  const details: unknown[] = [];
  element.addEventListener(type, (event) => {
    if (event instanceof CustomEvent) details.push(event.detail);
  });
  return details;
}
