import { SlewcurveError } from '../errors.js';

const PATTERN = /^([-+]?)(\d{1,4}):([0-5]?\d):([0-5]?\d)([:;])(\d{1,3}(?:\.\d+)?)$/;

/** Whether a text is written as `hh:mm:ss:ff` or `hh:mm:ss;ff`. */
export function isTimecode(text: string): boolean {
  return PATTERN.test(text);
}

/**
 * How frames are counted at a rate. Timecode counts whole frames; at 29.97 and its multiples the drop-frame count leaves out the first two labels (four at
 * 59.94) of every minute that is no tenth, so that labels keep to the clock (SMPTE ST 12-1, from memory: 00:01:00;02 is frame 1800, 00:10:00;00 frame
 * 17982). Rates that have no such count, 23.976 among them, run slow against the clock.
 */
interface Count {
  /** Labels a second. */
  readonly labels: number;
  /** Labels left out in a minute; 0 where none are. */
  readonly dropped: number;
}

function countOf(fps: number): Count {
  const labels = Math.max(1, Math.round(fps));
  const isShort = Math.abs((fps * 1001) / (labels * 1000) - 1) < 1e-4 && labels % 30 === 0;
  return { labels, dropped: isShort ? labels / 15 : 0 };
}

/** The label of a frame, from 0: `hh:mm:ss:ff`, with a semicolon before the frames where labels are dropped. Hours go on past 23. */
export function timecodeOf(frame: number, fps: number): string {
  const { labels, dropped } = countOf(fps);
  const size = Math.abs(frame);
  const whole = Math.floor(size);
  const label = whole + droppedBefore(whole, labels, dropped);
  const [minutes, seconds] = [Math.floor(label / (60 * labels)), Math.floor(label / labels) % 60];
  const rest = Number(((label % labels) + (size - whole)).toFixed(2));
  const frames = `${rest < 10 ? '0' : ''}${rest}`;
  const clock = [Math.floor(minutes / 60), minutes % 60, seconds]
    .map((part) => String(part).padStart(2, '0'))
    .join(':');
  return `${frame < 0 && size > 0 ? '-' : ''}${clock}${dropped > 0 ? ';' : ':'}${frames}`;
}

/** How many labels are left out up to a frame. */
function droppedBefore(frame: number, labels: number, dropped: number): number {
  if (dropped === 0) return 0;
  const tenMinutes = 600 * labels - 9 * dropped;
  const minute = 60 * labels - dropped;
  const within = frame % tenMinutes;
  const minutes = within < dropped ? 0 : Math.floor((within - dropped) / minute);
  return dropped * (9 * Math.floor(frame / tenMinutes) + minutes);
}

/**
 * The frame of a label. A semicolon counts by drop-frame; a colon counts every label.
 *
 * @throws SlewcurveError `time.unreadable`; `time.no-such-frame` where the rate has no such label
 */
export function frameOfTimecode(text: string, fps: number): number {
  const [, sign, hours, minutes, seconds, separator, frames] = PATTERN.exec(text) ?? [];
  if (hours === undefined)
    throw new SlewcurveError('time.unreadable', `"${text.slice(0, 40)}" is no hh:mm:ss:ff.`);
  const { labels, dropped } = countOf(fps);
  const frame = Number(frames);
  const whole = 60 * Number(hours) + Number(minutes);
  if (separator === ';' && dropped === 0)
    throw noSuchFrame(
      text,
      `only 29.97 frames a second and its multiples drop labels, and this is ${fps}; write a colon before the frames`,
    );
  if (frame >= labels)
    throw noSuchFrame(text, `at ${fps} frames a second they count from 00 to ${labels - 1}`);
  if (separator === ';' && whole % 10 !== 0 && Number(seconds) === 0 && frame < dropped)
    throw noSuchFrame(
      text,
      `the drop-frame count leaves out 00 to ${String(dropped - 1).padStart(2, '0')} at this minute`,
    );
  const label = (60 * whole + Number(seconds)) * labels + frame;
  const left = separator === ';' ? dropped * (whole - Math.floor(whole / 10)) : 0;
  return (sign === '-' ? -1 : 1) * (label - left);
}

function noSuchFrame(text: string, why: string): SlewcurveError {
  return new SlewcurveError('time.no-such-frame', `There is no frame ${text}: ${why}.`);
}
