import { axesSuspect } from './rules/file/axes-suspect.js';
import { coarse } from './rules/file/coarse.js';
import { componentOrder } from './rules/file/component-order.js';
import { degreesOrRadians } from './rules/file/degrees-or-radians.js';
import { hole } from './rules/file/hole.js';
import { idle } from './rules/file/idle.js';
import { mirrorMatrix } from './rules/file/mirror-matrix.js';
import { notFinite } from './rules/file/not-finite.js';
import { notNormalised } from './rules/file/not-normalised.js';
import { ragged } from './rules/file/ragged.js';
import { timeGrid } from './rules/file/time-grid.js';
import { timeOrder } from './rules/file/time-order.js';
import { cutSmear } from './rules/jump/cut-smear.js';
import { firstKey } from './rules/jump/first-key.js';
import { freeze } from './rules/jump/freeze.js';
import { loneKey } from './rules/jump/lone-key.js';
import { shelf } from './rules/jump/shelf.js';
import { turnedOver } from './rules/jump/turned-over.js';
import { axisKick } from './rules/pace/axis-kick.js';
import { bow } from './rules/pace/bow.js';
import { comb } from './rules/pace/comb.js';
import { cubicCollapse } from './rules/pace/cubic-collapse.js';
import { elbow } from './rules/pace/elbow.js';
import { endTangent } from './rules/pace/end-tangent.js';
import { hardStop } from './rules/pace/hard-stop.js';
import { lurch } from './rules/pace/lurch.js';
import { overrun } from './rules/pace/overrun.js';
import { pearls } from './rules/pace/pearls.js';
import { reverse } from './rules/pace/reverse.js';
import { tangentScale } from './rules/pace/tangent-scale.js';
import { blendSide } from './rules/seam/blend-side.js';
import { doubledEnd } from './rules/seam/doubled-end.js';
import { tooMany } from './rules/keys/too-many.js';
import { clipJoin } from './rules/seam/join.js';
import { loopGap } from './rules/seam/loop-gap.js';
import { loopKink } from './rules/seam/loop-kink.js';
import { creep } from './rules/shake/creep.js';
import { grain } from './rules/shake/grain.js';
import { hum } from './rules/shake/hum.js';
import { eulerFlip } from './rules/turn/euler-flip.js';
import { gimbal } from './rules/turn/gimbal.js';
import { half } from './rules/turn/half.js';
import { longWay } from './rules/turn/long-way.js';
import { lost } from './rules/turn/lost.js';
import { signFlip } from './rules/turn/sign-flip.js';
import { wrap } from './rules/turn/wrap.js';
import { accelLimit } from './rules/limit/accel.js';
import { jerkLimit } from './rules/limit/jerk.js';
import { pictureLimit } from './rules/limit/picture.js';
import { speedLimit } from './rules/limit/speed.js';
import type { Rule } from './rule.js';

/** Every rule that is built. */
export const RULES: readonly Rule[] = Object.freeze([
  notFinite,
  notNormalised,
  timeOrder,
  timeGrid,
  coarse,
  componentOrder,
  degreesOrRadians,
  axesSuspect,
  mirrorMatrix,
  idle,
  hole,
  ragged,
  signFlip,
  half,
  longWay,
  wrap,
  eulerFlip,
  gimbal,
  lost,
  firstKey,
  freeze,
  turnedOver,
  cutSmear,
  loneKey,
  shelf,
  elbow,
  hardStop,
  axisKick,
  tangentScale,
  endTangent,
  cubicCollapse,
  overrun,
  lurch,
  pearls,
  bow,
  comb,
  reverse,
  grain,
  hum,
  creep,
  loopGap,
  loopKink,
  doubledEnd,
  clipJoin,
  blendSide,
  speedLimit,
  accelLimit,
  jerkLimit,
  pictureLimit,
  tooMany,
]);
