/** A pattern of paths, forward slashes: `*` and `?` within a folder, `**` over folders, `[a-z]`, `{a,b}`. */
export interface Glob {
  /** The folders before the first one that is a pattern; empty where there are none. */
  readonly root: string;
  /** Folders to go down from the root at most; Infinity with `**`. */
  readonly depth: number;
  matches(path: string): boolean;
}

/** Whether a word is a pattern rather than a path. */
export function isGlob(word: string): boolean {
  return /[*?[{]/.test(word);
}

/** A glob out of a word; backslashes are slashes, as Windows writes paths. A name that begins with a full stop must be asked for by one. */
export function glob(word: string): Glob {
  const pattern = word.replaceAll('\\', '/');
  const segments = pattern.split('/');
  const at = segments.findIndex(isGlob);
  const rest = segments.slice(at);
  const alternatives = withoutBraces(pattern).map(expression);
  // Alternatives may hold slashes of their own.
  const deep = rest.some((segment) => segment === '**' || segment.includes('{'));
  return {
    root: at > 0 ? segments.slice(0, at).join('/') || '/' : '',
    depth: deep ? Infinity : rest.length - 1,
    matches: (path) => alternatives.some((one) => one.test(path)),
  };
}

/** `a{b,c}d` as `abd` and `acd`; the innermost braces first, so that they may stand within each other. */
function withoutBraces(pattern: string): string[] {
  const braces = /\{([^{}]*)\}/.exec(pattern);
  if (!braces) return [pattern];
  const [whole, inside = ''] = braces;
  const before = pattern.slice(0, braces.index);
  const after = pattern.slice(braces.index + whole.length);
  return inside.split(',').flatMap((one) => withoutBraces(`${before}${one}${after}`));
}

function expression(pattern: string): RegExp {
  const segments = pattern.split('/');
  const last = segments.length - 1;
  const text = segments.map((segment, i) => {
    const slash = i < last ? '/' : '';
    if (segment !== '**') return `${segmentExpression(segment)}${slash}`;
    return i < last ? '(?:(?!\\.)[^/]+/)*' : '(?:(?!\\.)[^/]+/)*(?!\\.)[^/]+';
  });
  return new RegExp(`^${text.join('')}$`, 'u');
}

const PART = /\*+|\?|\[[!^]?\]?[^\]]*\]|[^*?[]+|\[/gu;

function segmentExpression(segment: string): string {
  const parts = [...segment.matchAll(PART)].map(([part]) => {
    if (part.startsWith('*')) return '[^/]*';
    if (part === '?') return '[^/]';
    if (part.length > 1 && part.startsWith('[')) return classExpression(part);
    return part.replace(/[\\^$.*+?()[\]{}|/]/g, '\\$&');
  });
  return `${/^[*?[]/.test(segment) ? '(?!\\.)' : ''}${parts.join('')}`;
}

function classExpression(part: string): string {
  const inside = part.slice(1, -1);
  const not = /^[!^]/.test(inside);
  const letters = (not ? inside.slice(1) : inside).replace(/[\\\]^[]/g, '\\$&');
  return `(?!/)[${not ? '^' : ''}${letters}]`;
}
