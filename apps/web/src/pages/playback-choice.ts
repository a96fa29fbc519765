import { html, type TemplateResult } from 'lit';
import { PLAYBACKS, playAs, type PlaybackId, type RotationTrack } from '@slewcurve/core';
import { valueOf } from '@slewcurve/elements/theme/value-of';

/** What becomes of a choice. */
export interface PlaybackActions {
  play(id: PlaybackId | undefined): void;
  compare(id: PlaybackId | undefined): void;
}

/** By which playback a track is drawn, and which other one stands beside it. */
export function playbackChoice(
  track: RotationTrack | undefined,
  playback: PlaybackId,
  second: PlaybackId | undefined,
  actions: PlaybackActions,
): TemplateResult {
  const can = track ? playbacksFor(track) : [];
  const chosen = (event: Event): PlaybackId | undefined => can.find((id) => id === valueOf(event));
  return html`<label
      >as played:
      <select @change=${(event: Event) => actions.play(chosen(event))}>
        ${can.map((id) => option(id, id === playback))}
      </select></label
    >
    <label
      >compare with:
      <select @change=${(event: Event) => actions.compare(chosen(event))}>
        <option value="">nothing</option>
        ${can.filter((id) => id !== playback).map((id) => option(id, id === second))}
      </select></label
    >
    <span class="says">${PLAYBACKS[playback].says}</span>`;
}

function option(id: PlaybackId, chosen: boolean): TemplateResult {
  return html`<option value=${id} ?selected=${chosen}>${id.replaceAll('-', ' ')}</option>`;
}

/** Playbacks that need nothing that the track does not store. Asked of its kind alone, without its keys: compiling them costs. */
function playbacksFor(track: RotationTrack): PlaybackId[] {
  const kind = { ...track, times: new Float64Array(), values: new Float64Array(), breaks: [] };
  return Object.values(PLAYBACKS).flatMap(({ id }) => {
    try {
      playAs(kind, id);
      return [id];
    } catch {
      return [];
    }
  });
}
