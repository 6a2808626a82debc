import type { JobState } from '../../shared/words';
import { StatusChip, type Tone } from './status-chip';

const STATES: Record<JobState, { tone: Tone; icon: string; word: string }> = {
  queued: { tone: 'plain', icon: '○', word: 'waiting' },
  running: { tone: 'accent', icon: '◐', word: 'running' },
  done: { tone: 'good', icon: '●', word: 'done' },
  failed: { tone: 'bad', icon: '✕', word: 'failed' },
  cancelled: { tone: 'warn', icon: '◌', word: 'cancelled' },
};

/** The state of a job in one word. */
export function JobStateChip({ state }: { state: JobState }) {
  const { tone, icon, word } = STATES[state];
  return (
    <StatusChip tone={tone} icon={icon}>
      {word}
    </StatusChip>
  );
}
