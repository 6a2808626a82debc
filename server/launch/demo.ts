import { existsSync } from 'node:fs';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { PROJECT_ROOT } from './project';
import { say } from './say';

/** Where the demo is told to put itself, and the account of it. */
export interface DemoOptions {
  appUrl: string;
  dataDir: string;
  webUrl: string;
}

export interface DemoOutcome {
  /** True when this call filled an empty installation. */
  seeded: boolean;
  /** How to sign in to the demo; empty when the installation holds none. */
  signIns: { role: string; email: string; password: string }[];
}

interface DemoModule {
  seedDemo(options: DemoOptions): Promise<DemoOutcome>;
}

const DEMO_FILE = path.join(PROJECT_ROOT, 'seed', 'seed-demo.ts');

/**
 * Fills an empty installation with the demo group, over the API of the running server; returns the demo's sign-ins.
 * IDEM_DEMO=0 leaves it out. A demo that fails is told and does not stop the server.
 */
export async function setUpDemo(
  options: DemoOptions,
  env: NodeJS.ProcessEnv,
): Promise<DemoOutcome['signIns']> {
  if (env.IDEM_DEMO === '0' || !existsSync(DEMO_FILE)) return [];
  try {
    // Loaded here only: later starts with IDEM_DEMO=0 should not pay for the generator.
    const demo = (await import(pathToFileURL(DEMO_FILE).href)) as DemoModule;
    return (await demo.seedDemo(options)).signIns;
  } catch (error) {
    say(`The demo could not be set up: ${error instanceof Error ? error.message : String(error)}`);
    return [];
  }
}
