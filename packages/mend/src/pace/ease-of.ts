import { EASES, type Ease, type EaseName, SlewcurveError, cubicBezierEase, rampEase } from '@slewcurve/core';

/**
 * The ease of a name: one of `EASES`, "trapezoid 0.3" and "s-curve 0.3" with the share of the time that each ramp takes, or W3C's
 * "cubic-bezier(x1, y1, x2, y2)".
 *
 * @throws SlewcurveError `step.unknown-ease`, `ease.bad-ramp`, `ease.bad-handle`
 */
export function easeOf(name: string): Ease {
  if (isEaseName(name)) return EASES[name];
  const ramp = /^(trapezoid|s-curve) (\d*\.?\d+)$/.exec(name);
  if (ramp) return rampEase({ rise: Number(ramp[2]), corner: ramp[1] === 's-curve' ? 0.5 : 0 });
  const handles = /^cubic-bezier\(([^,()]+),([^,()]+),([^,()]+),([^,()]+)\)$/.exec(name);
  if (handles) {
    const [x1, y1, x2, y2] = handles.slice(1).map(Number);
    return cubicBezierEase(x1, y1, x2, y2);
  }
  throw new SlewcurveError(
    'step.unknown-ease',
    `"${name.slice(0, 60)}" is no ease. There are ${Object.keys(EASES).join(', ')}, "trapezoid 0.3", "s-curve 0.3" and "cubic-bezier(0.42, 0, 0.58, 1)".`,
  );
}

function isEaseName(name: string): name is EaseName {
  return Object.hasOwn(EASES, name);
}
