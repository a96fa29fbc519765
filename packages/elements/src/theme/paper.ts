import { css, type CSSResult } from 'lit';

/**
 * Paper and ink for every element. A page may set `--slew-scheme: light` or `dark` (default: what the reader's system says), and
 * any ink by its name without the underscore. Contrast of the inks on paper was measured: 4.8 : 1 and more.
 *
 * @cssproperty --slew-scheme - `light dark`, `light` or `dark`
 * @cssproperty --slew-paper --slew-ink --slew-soft --slew-hairline --slew-trace --slew-second --slew-limit --slew-caution
 */
export const paper: CSSResult = css`
  :host {
    color-scheme: var(--slew-scheme, light dark);
    --_paper: var(--slew-paper, light-dark(#faf7f0, #14181f));
    --_sheet: var(--slew-sheet, light-dark(#fffdf8, #191e26));
    --_ink: var(--slew-ink, light-dark(#24211b, #ece6d9));
    --_soft: var(--slew-soft, light-dark(#625c50, #a9a79e));
    --_hairline: var(--slew-hairline, light-dark(#e2dbcb, #2b323d));
    --_rule: var(--slew-rule, light-dark(#b9b09c, #4c5563));
    --_trace: var(--slew-trace, light-dark(#1f4e79, #8fc1e8));
    --_second: var(--slew-second, light-dark(#7b3f72, #d9a6d0));
    --_limit: var(--slew-limit, light-dark(#a23b0b, #f2b44b));
    --_caution: var(--slew-caution, light-dark(#9e5e00, #f2b44b));
    --_prose:
      'Iowan Old Style', 'Palatino Linotype', Palatino, 'URW Palladio L', Charter, 'Bitstream Charter',
      Georgia, 'DejaVu Serif', serif;
    display: block;
    background: var(--_paper);
    color: var(--_ink);
    font: 400 1rem/1.5 var(--_prose);
    font-variant-numeric: tabular-nums lining-nums;
    text-rendering: optimizeLegibility;
  }
  :host([hidden]) {
    display: none;
  }
  :host([scheme='light']) {
    color-scheme: light;
  }
  :host([scheme='dark']) {
    color-scheme: dark;
  }
  .swatch,
  [hidden] {
    display: none !important;
  }
  .unseen {
    position: absolute;
    width: 1px;
    height: 1px;
    overflow: hidden;
    clip-path: inset(50%);
    white-space: nowrap;
  }
  @media print {
    :host {
      color-scheme: light;
      --_paper: #fff;
      --_sheet: #fff;
      --_ink: #000;
      --_soft: #444;
      --_hairline: #ccc;
      --_rule: #888;
      --_trace: #000;
      --_second: #555;
      --_limit: #333;
      --_caution: #333;
    }
    .on-screen {
      display: none !important;
    }
  }
  @media (forced-colors: active) {
    :host {
      --_paper: Canvas;
      --_sheet: Canvas;
      --_ink: CanvasText;
      --_soft: CanvasText;
      --_hairline: GrayText;
      --_rule: GrayText;
      --_trace: LinkText;
      --_second: VisitedText;
      --_limit: CanvasText;
      --_caution: CanvasText;
    }
  }
`;
