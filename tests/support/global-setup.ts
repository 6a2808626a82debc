import { mkdtempSync, readdirSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { TestProject } from 'vitest/node';
import { startCluster } from '../../db/cluster';
import { lockHolder } from '../../db/cluster-lock';
import { migrate } from '../../db/migrate';

const FOLDER_PREFIX = 'idem-tests-';
const TEMPLATE_NAME = 'idem_template';
const YOUNG_MS = 60_000;

declare module 'vitest' {
  interface ProvidedContext {
    /** Superuser's address of the throw-away cluster. */
    adminUrl: string;
    /** The owner's address of the migrated template database; tests take copies of it. */
    ownerUrl: string;
    templateName: string;
  }
}

/** One throw-away cluster with a migrated template database for all test files of a project. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  removeAbandoned();
  const dataDir = mkdtempSync(path.join(tmpdir(), FOLDER_PREFIX));
  const remove = () => rmSync(dataDir, { recursive: true, force: true, maxRetries: 5 });
  try {
    const cluster = await startCluster({ dataDir, settings: 'throwaway' });
    const ownerUrl = await cluster.ensureDatabase(TEMPLATE_NAME);
    await migrate(ownerUrl);
    project.provide('adminUrl', cluster.adminUrl);
    project.provide('ownerUrl', ownerUrl);
    project.provide('templateName', TEMPLATE_NAME);
    return async () => {
      await cluster.stop();
      remove();
    };
  } catch (error) {
    remove();
    throw error;
  }
}

/**
 * A killed test run takes its server with it but leaves its folder. Young folders stay: their run may be about to
 * take its lock.
 */
function removeAbandoned(): void {
  for (const name of readdirSync(tmpdir())) {
    if (!name.startsWith(FOLDER_PREFIX)) continue;
    const folder = path.join(tmpdir(), name);
    const { uid, mtimeMs } = statSync(folder);
    const isOwn = uid === process.getuid?.() && Date.now() - mtimeMs > YOUNG_MS;
    const isHeld = lockHolder(path.join(folder, 'postgres', 'cluster.lock')) !== null;
    if (isOwn && !isHeld) rmSync(folder, { recursive: true, force: true });
  }
}
