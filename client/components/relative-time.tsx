import { useSyncExternalStore } from 'react';
import { timeAgo } from './time-ago';

const TICK_MS = 30_000;

function subscribe(onTick: () => void): () => void {
  const timer = setInterval(onTick, TICK_MS);
  return () => clearInterval(timer);
}

/** 'five minutes ago' with the exact time (UTC) on hover and in print. */
export function RelativeTime({ at }: { at: string }) {
  const now = useSyncExternalStore(subscribe, () => Math.floor(Date.now() / TICK_MS) * TICK_MS);
  const exact = `${at.slice(0, 10)} ${at.slice(11, 19)} UTC`;
  return (
    <time dateTime={at} title={exact} className="whitespace-nowrap">
      {timeAgo(Date.parse(at), now)}
    </time>
  );
}
