import { unpackChromium } from './launch';

/** Unpacks the browser once, before any test worker starts (two workers unpacking at once would collide). */
export default async function setup(): Promise<void> {
  if (!process.env.BROWSER_PATH && process.platform === 'linux' && process.arch === 'x64') await unpackChromium();
}
