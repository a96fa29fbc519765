import { readFileSync } from 'node:fs';
import type { Browser } from 'playwright';

/**
 * The most memory that any of the browser's tabs has had so far, MB: what is resident but for the pages that it shares with files, the
 * browser's own code above all. Undefined where the system does not tell.
 */
export async function peakOfTabs(browser: Browser): Promise<number | undefined> {
  const session = await browser.newBrowserCDPSession();
  const { processInfo } = await session.send('SystemInfo.getProcessInfo');
  await session.detach();
  const peaks = processInfo.filter(({ type }) => type === 'renderer').map(({ id }) => peakOf(id));
  return Math.max(...peaks) || undefined;
}

function peakOf(process: number): number {
  try {
    const status = readFileSync(`/proc/${process}/status`, 'utf8');
    const kilobytes = (field: string): number =>
      Number(new RegExp(`^${field}:\\s+(\\d+) kB$`, 'm').exec(status)?.[1] ?? 0);
    return Math.round((kilobytes('VmHWM') - kilobytes('RssFile') - kilobytes('RssShmem')) / 1024);
  } catch {
    return 0;
  }
}
