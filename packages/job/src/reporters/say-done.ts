import { sayStep } from '@slewcurve/mend';
import type { StepReport } from '../report.js';
import { sayFigure } from './say-figure.js';

/** Bends that are told one by one. */
const MOST_BENDS = 3;

/** What a step did, as people read it: its sentence, its changes, its price, and what it may want a look for. */
export function sayDone(step: StepReport): string {
  const keys = step.changed === 1 ? '1 key changed' : `${step.changed} keys changed`;
  const did = `${sayStep(step.step)} ${keys}, the largest by ${sayFigure(step.largest)}°; outside its span ${sayFigure(step.outside)}°; ${sayFigure(step.added)} s added`;
  return [
    `${did}${sayPrice(step)}.`,
    ...(step.dropped ?? []).map(sayDropped),
    ...sayMeeting(step),
    ...sayBends(step),
  ].join(' ');
}

function sayPrice({ price }: StepReport): string {
  if (!price) return '';
  const bytes = `${Math.abs(price.bytes)} bytes ${price.bytes < 0 ? 'less' : 'more'}`;
  const rounded =
    price.rounded === undefined ? '' : `, corners rounded by up to ${sayFigure(price.rounded)}°`;
  return `; as stored up to ${sayFigure(price.degrees)}° off${rounded}; ${bytes}`;
}

function sayDropped({ track, keys }: NonNullable<StepReport['dropped']>[number]): string {
  const listed =
    keys.length > 20 ? `${keys.slice(0, 20).join(', ')} and ${keys.length - 20} more` : keys.join(', ');
  return `Dropped of ${track}: ${keys.length === 1 ? 'key' : 'keys'} ${listed}.`;
}

function sayMeeting({ meeting }: StepReport): string[] {
  if (!meeting) return [];
  const { before, after, axis } = meeting;
  return [
    `Both sides turn at ${sayFigure(before)} and ${sayFigure(after)} deg/s now, about axes ${sayFigure(axis)}° apart, which no pace changes.`,
  ];
}

function sayBends({ bends = [] }: StepReport): string[] {
  if (bends.length === 0) return [];
  const told = bends
    .slice(0, MOST_BENDS)
    .map(({ time, jump }) => `${sayFigure(jump)} deg/s at ${time.toFixed(3)} s`);
  const more = bends.length > MOST_BENDS ? `, and ${bends.length - MOST_BENDS} more` : '';
  return [`Bends taken fast, where the rate changes at once: ${told.join(', ')}${more}.`];
}
