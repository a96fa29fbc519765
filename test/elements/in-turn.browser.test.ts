import { inTurn } from '@slewcurve/elements/theme/in-turn';
import { describe, expect, test } from 'vitest';

const picture = (): Promise<number> => new Promise(requestAnimationFrame);
const busyFor = (milliseconds: number): void => {
  for (const end = performance.now() + milliseconds; performance.now() < end;);
};
/** Pictures drawn from now on. */
const countPictures = (): { count: number } => {
  const pictures = { count: 0 };
  const next = (): void => {
    pictures.count++;
    requestAnimationFrame(next);
  };
  requestAnimationFrame(next);
  return pictures;
};

describe('work in turn', () => {
  test('is done at once where the picture has room', async () => {
    await picture();
    await picture();
    let done = false;
    void inTurn(() => (done = true));
    expect(done).toBe(true);
  });

  test('is spread over pictures where there is much of it, in the order in which it was asked for', async () => {
    await picture();
    const pictures = countPictures();
    const order: number[] = [];
    await Promise.all(
      Array.from({ length: 12 }, (_, i) =>
        inTurn(() => {
          busyFor(6);
          order.push(i);
        }),
      ),
    );
    expect(order).toEqual(Array.from({ length: 12 }, (_, i) => i));
    // 72 ms of work, of which a picture begins no more once it has done 10: at most two pieces each.
    expect(pictures.count).toBeGreaterThanOrEqual(5);
  });

  test('gives what it makes, or how it failed, and the rest goes on', async () => {
    const failed = inTurn(() => {
      throw new RangeError('no room');
    });
    const made = inTurn(() => 7);
    await expect(failed).rejects.toThrow('no room');
    expect(await made).toBe(7);
  });

  test('that asks for more work has it later, not within itself', async () => {
    await picture();
    await picture();
    const order: string[] = [];
    let inner: Promise<unknown> | undefined;
    await inTurn(() => {
      inner = inTurn(() => order.push('inner'));
      order.push('outer');
    });
    await inner;
    expect(order).toEqual(['outer', 'inner']);
  });
});
