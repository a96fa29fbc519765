import { css, type CSSResult } from 'lit';

export const portholeStyles: CSSResult = css`
  :host {
    max-width: 24rem;
  }
  figure {
    margin: 0;
  }
  .globe {
    position: relative;
    width: 100%;
    aspect-ratio: 1;
    touch-action: none;
    cursor: grab;
    border-radius: 50%;
  }
  .globe:active {
    cursor: grabbing;
  }
  canvas {
    display: block;
    width: 100%;
    height: 100%;
  }
  figcaption {
    font-size: 0.9375rem;
    line-height: 1.4;
    color: var(--_soft);
  }
  figcaption b {
    display: block;
    font-weight: 400;
    font-size: 1.0625rem;
    color: var(--_ink);
  }
  .play {
    display: flex;
    flex-wrap: wrap;
    align-items: center;
    gap: 0.25rem 0.5rem;
    margin-top: 0.5rem;
  }
  .play input[type='range'] {
    flex: 1 1 100%;
    min-width: 0;
    margin: 0;
  }
  .play label.wide {
    flex: 1 1 100%;
  }
  .play button:first-of-type {
    min-width: 5rem;
  }
  .empty {
    font-style: italic;
    color: var(--_soft);
  }
`;
