import type { RotationTrack } from '@slewcurve/core';
import { matchesPattern, type AppliedStep } from '@slewcurve/mend';
import type { HouseRules } from '@slewcurve/survey';

/** House rules whose declared cuts stand where the steps of a card have moved them. A cut of several tracks is told track by track where one moved. */
export function cutsAfter(
  house: HouseRules,
  tracks: readonly RotationTrack[],
  applied: readonly AppliedStep[],
): HouseRules {
  const paces = applied.filter(({ result }) => result.repaced !== undefined);
  if (paces.length === 0) return house;
  const cuts = house.declared.cuts.flatMap((cut) => {
    const meant = tracks.filter(
      ({ clip, id }) => matchesPattern(cut.clip, clip) && matchesPattern(cut.track, id),
    );
    return meant.map(({ clip, id }) => {
      const own = paces.filter(({ before }) => before.clip === clip && before.id === id);
      const time = own.reduce((old, { result }) => result.repaced?.retiming.newTime(old) ?? old, cut.time);
      return { clip, track: id, time };
    });
  });
  return { ...house, declared: { ...house.declared, cuts } };
}
