import { EventEmitter } from 'node:events';
import pg from 'pg';
import type { Context } from '../context';
import { JOB_CHANNEL } from './jobs';

const RECONNECT_MS = 1000;
const MAX_LISTENERS = 2000;

/** Announcements of job changes, one database connection for all listeners of the process. */
export interface JobFeed {
  /** Calls `heard` at every change of the job; returns how to stop listening. */
  listen(jobId: string, heard: () => void): () => void;
  close(): Promise<void>;
}

/** Opens the feed; a lost connection is opened again, and every listener is told to look once it is back. */
export function openJobFeed(context: Pick<Context, 'config' | 'log'>): JobFeed {
  const emitter = new EventEmitter();
  emitter.setMaxListeners(MAX_LISTENERS);
  let client: pg.Client | null = null;
  let timer: NodeJS.Timeout | null = null;
  let closed = false;

  async function connect(): Promise<void> {
    const next = new pg.Client({ connectionString: context.config.databaseUrl });
    next.on('notification', (message) => emitter.emit(message.payload ?? ''));
    next.on('error', () => reconnectLater(next));
    next.on('end', () => reconnectLater(next));
    client = next;
    try {
      await next.connect();
      await next.query(`listen ${JOB_CHANNEL}`);
      for (const name of emitter.eventNames()) emitter.emit(name);
    } catch {
      reconnectLater(next);
    }
  }

  function reconnectLater(lost: pg.Client): void {
    if (closed || client !== lost) return;
    client = null;
    context.log.warn('job feed lost its connection');
    timer = setTimeout(() => void connect(), RECONNECT_MS);
  }

  void connect();
  return {
    listen(jobId, heard) {
      emitter.on(jobId, heard);
      return () => emitter.off(jobId, heard);
    },
    async close() {
      closed = true;
      if (timer !== null) clearTimeout(timer);
      await client?.end();
    },
  };
}
