import { ensureClientBuilt } from '../../server/launch/client-build';

/** Browser tests drive the built client; it is built once, before them. */
export default async function setup(): Promise<void> {
  await ensureClientBuilt(() => process.stdout.write('Building the client …\n'));
}
