/** Milliseconds of work for one picture. Style, layout and paint come on top, and a picture has 50 at most. */
const FOR_ONE_PICTURE = 10;

const waiting: (() => void)[] = [];
let spent = 0;
let asked = false;
/** Work that asks for more must not have it at once: its time is not counted yet. */
let busy = false;

/**
 * Does work at once while there is room before the next picture, else before a later one, in turn: where much is to be drawn, the
 * page goes on drawing and answering meanwhile. One piece of work is never split; whoever has much cuts it up. Resolves to what the
 * work gives; rejects where it throws.
 */
export function inTurn<Made>(work: () => Made): Promise<Made> {
  return new Promise((resolve, reject) => {
    waiting.push(() => {
      try {
        resolve(work());
      } catch (error) {
        reject(error instanceof Error ? error : new Error(String(error)));
      }
    });
    if (!busy && waiting.length === 1 && spent < FOR_ONE_PICTURE) doNext();
    askForPicture();
  });
}

function doNext(): void {
  const work = waiting.shift();
  const from = performance.now();
  busy = true;
  work?.();
  busy = false;
  spent += performance.now() - from;
}

function nextPicture(): void {
  asked = false;
  spent = 0;
  while (waiting.length > 0 && spent < FOR_ONE_PICTURE) doNext();
  askForPicture();
}

/** Pages out of sight draw no pictures, and must go on all the same. */
function askForPicture(): void {
  if (asked || (waiting.length === 0 && spent === 0)) return;
  asked = true;
  if (document.hidden) setTimeout(nextPicture);
  else requestAnimationFrame(nextPicture);
}
