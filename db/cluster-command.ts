import { spawnSync, type SpawnOptions } from 'node:child_process';

/** The system account as which PostgreSQL runs; null = the present user. */
export type Account = { name: string; uid: number; gid: number } | null;

export interface BoundCommand {
  command: string;
  args: string[];
  options: SpawnOptions;
}

let canBind: boolean | undefined;

/** Whether the system has a setpriv that can tie the life of a process to its parent's. */
function hasSetpriv(): boolean {
  canBind ??= spawnSync('setpriv', ['--pdeathsig=TERM', '--', 'true'], { stdio: 'ignore' }).status === 0;
  return canBind;
}

/**
 * The command that runs `program` as `account` and gets `deathSignal` from the kernel when this process dies, even
 * by kill -9. setpriv replaces itself by the program, so the child's pid is the program's. Where setpriv is missing
 * the program just runs as the account.
 */
export function boundCommand(
  program: string,
  args: string[],
  deathSignal: 'INT' | 'QUIT' | 'TERM' | 'KILL',
  account: Account = null,
): BoundCommand {
  if (!hasSetpriv()) {
    return {
      command: program,
      args,
      options: account === null ? {} : { uid: account.uid, gid: account.gid },
    };
  }
  const become =
    account === null ? [] : [`--reuid=${account.uid}`, `--regid=${account.gid}`, '--init-groups'];
  return {
    command: 'setpriv',
    args: [...become, `--pdeathsig=${deathSignal}`, '--', program, ...args],
    options: {},
  };
}
