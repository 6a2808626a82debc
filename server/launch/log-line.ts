const ERROR_LEVEL = 50;

interface LogLine {
  level?: unknown;
  msg?: unknown;
  ready?: unknown;
  err?: { message?: unknown } | null;
}

function parse(line: string): LogLine | null {
  if (!line.startsWith('{')) return null;
  try {
    return JSON.parse(line) as LogLine;
  } catch {
    return null;
  }
}

/** Whether a log line says that its process is ready. */
export function saysReady(line: string): boolean {
  return parse(line)?.ready === true;
}

/** The problem that a log line tells, in a few words; null for lines of less weight. */
export function problemIn(line: string): string | null {
  const entry = parse(line);
  if (entry === null || typeof entry.level !== 'number' || entry.level < ERROR_LEVEL) return null;
  const parts = [entry.msg, entry.err?.message].filter((part) => typeof part === 'string');
  return parts.join(': ');
}
