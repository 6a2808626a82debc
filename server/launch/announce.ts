import type { DemoOutcome } from './demo';
import { say } from './say';

/** The address that a browser on this machine uses for a server on `host`. */
export function browserUrl(host: string, port: number): string {
  const reachable = host === '0.0.0.0' || host === '::' ? '127.0.0.1' : host;
  return `http://${reachable.includes(':') ? `[${reachable}]` : reachable}:${port}`;
}

/** Says where the product is and how to get in. */
export async function announce(url: string, webUrl: string, signIns: DemoOutcome['signIns']): Promise<void> {
  const lines = [`\nIdem is ready: ${url}`];
  if (signIns.length > 0) {
    lines.push('Demo sign-ins:');
    for (const { role, email, password } of signIns) {
      lines.push(`  ${role.padEnd(12)} ${email.padEnd(30)} ${password}`);
    }
  } else if (await needsSetup(webUrl)) {
    lines.push('Nobody has an account yet: the first person to open it makes the owner account.');
  }
  say([...lines, 'Ctrl-C stops it.'].join('\n'));
}

async function needsSetup(webUrl: string): Promise<boolean> {
  const answer = await fetch(`${webUrl}/api/session`);
  const state: unknown = await answer.json();
  return typeof state === 'object' && state !== null && 'needsSetup' in state && state.needsSetup === true;
}
