import type { PlaybackId } from '@slewcurve/core';
import type { HouseRules, Level } from '@slewcurve/survey';

/** What a survey of a file goes by. */
export interface JobSettings {
  /** How the file will be played; the worst of them counts, the first gives the figures of the roster. */
  readonly playbacks: readonly PlaybackId[];
  /** A finding at this level or above fails the file. */
  readonly failAt: Level;
  /** Warnings that are let pass where `failAt` is warning or note; errors never are. */
  readonly allowWarnings: number;
  readonly houseRules: HouseRules;
}
