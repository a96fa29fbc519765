// Riggers name a joint by the bone that turns at it, and an animator asks for the knee. Names as they are met in rigs and capture files;
// common practice, no source.
const BODY: Readonly<Record<string, RegExp>> = {
  knee: /lower.?leg|shin|calf|crus|tibia|knee|(left|right|^[lr])[._ -]?leg\b/,
  shin: /lower.?leg|shin|calf|crus|tibia|(left|right|^[lr])[._ -]?leg\b/,
  hip: /hip|pelvis|upper.?leg|up.?leg|thigh|femur/,
  thigh: /upper.?leg|up.?leg|thigh|femur/,
  ankle: /foot|ankle/,
  foot: /foot|ankle|toe/,
  toe: /toe|ball/,
  elbow: /lower.?arm|fore.?arm|elbow|ulna/,
  forearm: /lower.?arm|fore.?arm|ulna/,
  shoulder: /shoulder|clavicle|collar|upper.?arm|humerus|(left|right|^[lr])[._ -]?arm\b/,
  wrist: /wrist|hand/,
  finger: /finger|thumb|index|middle|ring|pinky|little/,
  back: /spine|back|chest|torso/,
  waist: /spine|waist|abdomen|torso/,
  chest: /chest|spine.?[2-9]|torso|thorax/,
  skull: /head/,
};
const SIDES: Readonly<Record<string, RegExp>> = {
  left: /left|(^|[._ -])l([._ -]|$)/,
  right: /right|(^|[._ -])r([._ -]|$)/,
};

/** Whether a word, as far as it is typed, is one of the body or its sides. */
export function isBodyWord(word: string): boolean {
  return wordsMeant(word).length > 0;
}

/** Whether a joint of this name is what people mean by a word of the body: "knee" is `lowerleg.r`, "left" is `hand.l`. */
export function isOfBody(joint: string, word: string): boolean {
  const name = joint.toLowerCase();
  return wordsMeant(word).some((names) => names.test(name));
}

/** A word is typed letter by letter: from the third on it counts. */
function wordsMeant(word: string): RegExp[] {
  return Object.entries({ ...BODY, ...SIDES }).flatMap(([known, names]) =>
    word.length > 2 && known.startsWith(word) ? [names] : [],
  );
}
