import { statfsSync } from 'node:fs';

/** 'durable' for data that must survive a power cut, 'throwaway' for tests. */
export type ClusterSettings = 'durable' | 'throwaway';

const COMMON = {
  listen_addresses: '127.0.0.1',
  // Debian's default folder for the socket is not writable for an ordinary user.
  unix_socket_directories: '',
  timezone: 'UTC',
  log_timezone: 'UTC',
  jit: 'off',
  random_page_cost: '1.1',
  // Nobody replicates from this server, and minimal WAL lets COPY into a new table skip the log altogether. The
  // price: backups are pg_dump or a copy of the stopped folder, not a base backup of the running server.
  wal_level: 'minimal',
  max_wal_senders: '0',
};

// Sized for bulk work on a machine of 2 cores and up; shared memory is only touched as far as it is used, so a
// small laptop carries it too.
const DURABLE = {
  shared_buffers: '256MB',
  work_mem: '32MB',
  maintenance_work_mem: '256MB',
  max_wal_size: '4GB',
  wal_compression: 'on',
  checkpoint_timeout: '15min',
};

const THROWAWAY = {
  shared_buffers: '128MB',
  max_connections: '200',
  fsync: 'off',
  synchronous_commit: 'off',
  full_page_writes: 'off',
};

// Containers often get 64 MB here; parallel queries would fail in it with "could not resize shared memory segment".
const SHARED_MEMORY_FOLDER = '/dev/shm';
const SHARED_MEMORY_NEEDED_BYTES = 512 * 1024 * 1024;

/** The arguments of the `postgres` program: settings stand here, not in a file, so that an update reaches old folders. */
export function serverArguments(settings: ClusterSettings, port: number): string[] {
  const all = {
    ...COMMON,
    ...(settings === 'durable' ? DURABLE : THROWAWAY),
    ...(hasSharedMemory() ? {} : { dynamic_shared_memory_type: 'mmap' }),
    port: String(port),
  };
  return Object.entries(all).flatMap(([name, value]) => ['-c', `${name}=${value}`]);
}

function hasSharedMemory(): boolean {
  try {
    const { bsize, blocks } = statfsSync(SHARED_MEMORY_FOLDER);
    return bsize * blocks >= SHARED_MEMORY_NEEDED_BYTES;
  } catch {
    return false;
  }
}

/** The arguments of `initdb`. Text sorts by code point, so that no system locale is needed or can change the order. */
export function initArguments(settings: ClusterSettings): string[] {
  const always = ['-U', 'postgres', '--auth=scram-sha-256', '--encoding=UTF8', '--locale=C.UTF-8'];
  return [...always, settings === 'durable' ? '--data-checksums' : '--no-sync'];
}
