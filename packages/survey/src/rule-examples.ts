/** Of each rule, what it names and what it does not, in numbers: the cases of its own tests, or their like. */
export const RULE_EXAMPLES: Readonly<Record<string, readonly [fires: string, quiet: string]>> = Object.freeze(
  {
    'file.not-finite': ['NaN for the third number of one key.', 'A take whose numbers are all finite.'],
    'file.not-normalised': [
      'One quaternion of length 1.0011 stored as floats.',
      'A quaternion of length 1.0074 stored as normalised bytes, which round so.',
    ],
    'file.time-order': [
      'Two keys 1e-6 s apart in a track of five keys a second.',
      'Times that rise by a frame each.',
    ],
    'file.time-grid': [
      '60 frames a second written with three decimals.',
      'Stamps of a capture that no rounding explains.',
    ],
    'file.coarse': [
      'A vane stored in bytes that turns by 3 deg/s: most steps read zero.',
      'The same in floats.',
    ],
    'file.component-order': [
      'Twenty joints of a walk stored w x y z and read x y z w.',
      'Nine props that lie upside down.',
    ],
    'file.degrees-or-radians': [
      'Twenty joints of a walk with no angle above 1.05 as read.',
      'The same walk with angles up to 60°.',
    ],
    'file.axes-suspect': [
      'A figure whose root begins turned by 90° about x.',
      'A figure that begins turned by 90° about the up axis.',
    ],
    'file.mirror-matrix': [
      'A table of matrices whose first columns are negated; a node 0.1 off square above a joint.',
      'A node of scale −1, 1, 1; matrices with uneven scales.',
    ],
    'file.idle': ['24 keys that all say the same.', 'A single key.'],
    'file.hole': ['Five samples lost out of a turn of 30 deg/s.', 'A declared cut between two frames.'],
    'file.ragged': [
      'A track that ends a second before its clip.',
      'A track whose last key is a quarter of a frame early.',
    ],
    'turn.sign-flip': [
      'q, then −q: a step of 0.4° that is 359.6° the long way.',
      'Keys all on one side; STEP.',
    ],
    'turn.half': ['Keys at 0° and 180°.', 'Keys 149° apart.'],
    'turn.long-way': [
      '(0°, 0°, 0°), then (150°, 0°, 90°) in the order XYZ.',
      '(0°, 0°, 0°), then (90°, 0°, 0°).',
    ],
    'turn.wrap': ['An angle that goes from 359° to 1°.', 'The same unwrapped, 359° to 361°.'],
    'turn.euler-flip': ['(10°, 20°, 30°), then (190°, 160°, 210°).', 'The same triple twice.'],
    'turn.gimbal': [
      '(0°, 88°, 0°), then (60°, 88°, −60°) in the order XYZ.',
      'The same steps with 40° in the middle.',
    ],
    'turn.lost': [
      'A declared spin of 1,200 turns a minute keyed 30 times a second.',
      'The same keyed every 90°.',
    ],
    'jump.lone-key': [
      '0°, 1°, 91°, 3°, 4° at 30 keys a second inside a clip.',
      'A whip of 180° in 0.4 s; a dead stop; a bounce.',
    ],
    'jump.shelf': [
      'A turn of 30 deg/s that goes 6° further within one frame and then on as before.',
      'The same declared a whip, or a cut.',
    ],
    'jump.first-key': ['A rest pose 80° away on frame 0 of a capture.', 'A clip that begins in a fast move.'],
    'jump.freeze': [
      'Four repeated frames in a pan, and a leap that makes up for them.',
      'A hold that is eased into.',
    ],
    'jump.turned-over': ['Twenty frames turned by 180° and back.', 'A somersault over half a second.'],
    'jump.cut-smear': [
      'A camera that turns by 156° within 33 ms, calm before and after.',
      'A whip pan over six frames.',
    ],
    'pace.elbow': [
      '±30° at 1 Hz keyed each 0.2 s under straight segments: 197 deg/s at a key.',
      'The same eased through.',
    ],
    'pace.hard-stop': [
      'A camera’s pan of 20 deg/s that ends in its last key.',
      'The same with 0.3 s of easing at the end.',
    ],
    'pace.axis-kick': [
      '40 deg/s about y, then 40 deg/s about an axis 70° away.',
      'An axis that bends by 20°.',
    ],
    'pace.tangent-scale': [
      'Tangents a hundred times as long as the way between the keys.',
      'Tangents twice as long.',
    ],
    'pace.end-tangent': ['A first in-tangent that is not zero.', 'Zeros at both ends.'],
    'pace.cubic-collapse': [
      '0° and 10° under CUBICSPLINE, the second key negated: a length of 0.044.',
      '0° and 170° on one side: 0.74.',
    ],
    'pace.overrun': [
      'Keys at 0°, 60°, 60° and 0° with tangents of finite differences: 7.5° in the hold.',
      'The same with flat tangents at the hold.',
    ],
    'pace.lurch': [
      'Keys at 0, 1, 1.1 and 2.1 s of a steady turn, with tangents as if they were even.',
      'The same with tangents weighted by time.',
    ],
    'pace.pearls': [
      'A spin of 10 deg/s in seven keys that stops at each.',
      'The same keys with the spin’s own tangents.',
    ],
    'pace.bow': ['A machine’s keys 90° apart played by chords: 1.17 times.', 'The same played by arcs.'],
    'pace.comb': [
      '24 frames a second shown at 30: every fifth step repeats.',
      'The same baked at its own rate.',
    ],
    'pace.reverse': [
      'A pan of 20 deg/s that runs back by half a degree within 0.15 s.',
      'A swing; anticipation before the start.',
    ],
    'shake.grain': ['Noise of 0.15° an axis on a joint at 60 keys a second.', 'The same joint without it.'],
    'shake.hum': ['A camera’s pan of 5 deg/s with ±0.1° at 8 Hz.', 'The pan alone; a gait.'],
    'shake.creep': ['A prop in a declared hold that turns by 0.25 deg/s.', 'Breathing, which comes back.'],
    'seam.loop-gap': [
      'A declared loop that ends 3° off its start.',
      'The same clip, not declared to repeat.',
    ],
    'seam.loop-kink': [
      'A declared loop that closes and starts at another rate than it ends with.',
      'A sine of a whole period.',
    ],
    'seam.doubled-end': [
      'A declared loop whose last two keys are the same while it turns.',
      'A loop that slows down to its end.',
    ],
    'seam.join': [
      'A walk that ends 3° off the start of the run that it is declared to go on into.',
      'The same two clips, not declared to join.',
    ],
    'seam.blend-side': [
      'Two clips that are declared to be mixed, 5° apart and stored with opposite signs.',
      'The same on one side.',
    ],
    'keys.too-many': [
      'A steady turn in 61 keys, 30 % asked for in the house rules: 59 could go.',
      'The same where nobody asked; keys that zigzag by 1°.',
    ],
    'keys.too-few': [
      'Keys at 0°, 80° and 120° a second apart, the middle one left out, 5° allowed: 20° off.',
      'Keys at 0°, 60° and 120°, the middle one left out.',
    ],
    'keys.drift': [
      'A key of a copy that is 10° off where 5° are allowed.',
      'The same where 10° are allowed.',
    ],
    'limit.speed': [
      'A machine limited to 30 deg/s that reaches 43 deg/s.',
      'A joint without a limit in the house rules.',
    ],
    'limit.accel': [
      'A machine limited to 40 deg/s² that takes 60.',
      'A track without a limit in the house rules.',
    ],
    'limit.jerk': [
      'A machine limited in jerk that starts at full acceleration.',
      'A track without a limit in the house rules.',
    ],
    'limit.picture': [
      'A pan of a picture’s width in 4 s at 24 frames a second.',
      'The same width in 10 s; a declared whip.',
    ],
  },
);
