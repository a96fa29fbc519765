/** What the command tells the shell. */
export const EXIT: { readonly pass: 0; readonly fail: 1; readonly unable: 2 } = Object.freeze({
  /** Nothing at or above the failing level. */
  pass: 0,
  /** Findings at or above it. */
  fail: 1,
  /** Could not do it: usage, rules file, no match, unreadable input, internal. Also where both happened. */
  unable: 2,
});
