import type { PlaybackId } from '@slewcurve/core';
import type { HouseRules, Level } from '@slewcurve/survey';
import type { SaidConventions } from './conventions.js';
import type { MatrixSettings } from './playback-matrix.js';

/** What a survey of a file goes by. */
export interface JobSettings {
  /** How the file will be played; the worst of them counts, the first gives the figures of the roster. */
  readonly playbacks: readonly PlaybackId[];
  /** A finding at this level or above fails the file. */
  readonly failAt: Level;
  /** Warnings that are let pass where `failAt` is warning or note; errors never are. */
  readonly allowWarnings: number;
  readonly houseRules: HouseRules;
  /** Frames per second of every clip, in the place of the rate that was found. */
  readonly frameRate?: number;
  /** What people say of the file where it is silent. */
  readonly said?: SaidConventions;
  /** The playbacks by tick rates that are looked at; left out: none. */
  readonly matrix?: MatrixSettings;
}
