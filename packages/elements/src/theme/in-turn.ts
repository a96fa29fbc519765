/** Milliseconds of work for one picture. Style, layout and paint come on top, and a picture has 50 at most. */
const FOR_ONE_PICTURE = 10;

const waiting: (() => void)[] = [];
let spent = 0;
let asked = false;
/** Work that asks for more must not have it at once: its time is not counted yet. */
let busy = false;

/**
 * Does work at once while there is room before the next picture, else before a later one, in turn: where much is to be drawn, the
 * page goes on drawing and answering meanwhile. One piece of work is never split; whoever has much cuts it up.
 */
export function inTurn(work: () => void): void {
  waiting.push(work);
  if (!busy && waiting.length === 1 && spent < FOR_ONE_PICTURE) doNext();
  askForPicture();
}

/** `inTurn` for the `scheduleUpdate` of an element: its update, done when its turn comes. */
export function updateInTurn(update: () => void): Promise<void> {
  return new Promise((resolve, reject) => {
    inTurn(() => {
      try {
        update();
        resolve();
      } catch (error) {
        reject(error instanceof Error ? error : new Error(String(error)));
      }
    });
  });
}

function doNext(): void {
  const work = waiting.shift();
  const from = performance.now();
  busy = true;
  try {
    work?.();
  } finally {
    busy = false;
    spent += performance.now() - from;
  }
}

function nextPicture(): void {
  asked = false;
  spent = 0;
  try {
    while (waiting.length > 0 && spent < FOR_ONE_PICTURE) doNext();
  } finally {
    // Also where a piece of work failed: the others have their turn.
    askForPicture();
  }
}

/** Pages out of sight draw no pictures, and must go on all the same. */
function askForPicture(): void {
  if (asked || (waiting.length === 0 && spent === 0)) return;
  asked = true;
  if (document.hidden) setTimeout(nextPicture);
  else requestAnimationFrame(nextPicture);
}
