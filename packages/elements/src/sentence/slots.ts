/** A piece of a sentence: words as they stand, or a slot that can be filled otherwise. */
export type SentencePiece =
  | { readonly kind: 'words'; readonly text: string }
  | { readonly kind: 'slot'; readonly text: string; readonly unit: string; readonly label: string };

/**
 * Numbers of a sentence with what stands around them. A number inside a name (`spine_02`, `1H_Melee`, `leg.2`) is part of the
 * name and no slot.
 */
const NUMBER = /(?<![\p{L}\p{N}_./:#[-])[−-]?\d+(?:,\d{3})*(?:\.\d+)?(?![\p{L}\p{N}_/]|\.\p{L}|:\d)/gu;

const UNITS: readonly { readonly unit: string; readonly pattern: RegExp; readonly says: string }[] = [
  { unit: 'deg/s', pattern: /^ ?(?:deg\/s|°\/s)/, says: 'speed in degrees a second' },
  { unit: '°', pattern: /^ ?(?:°|deg\b)/, says: 'angle in degrees' },
  { unit: 'ms', pattern: /^ ?ms\b/, says: 'time in milliseconds' },
  { unit: 's', pattern: /^ ?s\b/, says: 'time in seconds' },
  { unit: 'Hz', pattern: /^ ?Hz\b/, says: 'frequency in hertz' },
  { unit: 'keys', pattern: /^ ?(?:keys|key steps|steps)\b/, says: 'number of keys' },
];

/** The sentence in pieces: every number is a slot, labelled by the word before it and its unit. */
export function sentencePieces(sentence: string): SentencePiece[] {
  const pieces: SentencePiece[] = [];
  let at = 0;
  for (const match of sentence.matchAll(NUMBER)) {
    if (match.index > at) pieces.push({ kind: 'words', text: sentence.slice(at, match.index) });
    const after = sentence.slice(match.index + match[0].length);
    pieces.push({ kind: 'slot', text: match[0], ...labelOf(sentence.slice(0, match.index), after) });
    at = match.index + match[0].length;
  }
  if (at < sentence.length) pieces.push({ kind: 'words', text: sentence.slice(at) });
  return pieces;
}

/** The sentence with slot number `slot` (counted from 0) filled with `text`. */
export function fillSlot(sentence: string, slot: number, text: string): string {
  let count = -1;
  return sentencePieces(sentence)
    .map((piece) => (piece.kind === 'slot' && ++count === slot ? text.trim() || piece.text : piece.text))
    .join('');
}

/** A slot nudged by `steps` of its last digit, as it is written: "0.30" by 1 is "0.31". */
export function nudge(text: string, steps: number): string {
  const value = Number(text.replaceAll(',', '').replace('−', '-'));
  if (!Number.isFinite(value)) return text;
  const places = /\.(\d+)/.exec(text)?.[1].length ?? 0;
  return (value + steps * 10 ** -places).toFixed(places);
}

function labelOf(before: string, after: string): { unit: string; label: string } {
  const unit = UNITS.find(({ pattern }) => pattern.test(after));
  const clean = before.replace(/[\s,;:(]+$/, '');
  const word = /[\p{L}-]+$/u.exec(clean)?.[0] ?? '';
  const says = unit?.says ?? (/^keys?$/.test(word) ? 'number of the key' : 'number');
  return { unit: unit?.unit ?? '', label: word ? `${word}, ${says}` : says };
}
