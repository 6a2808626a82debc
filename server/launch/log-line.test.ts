import { describe, expect, it } from 'vitest';
import { problemIn, saysReady } from './log-line';

describe('a line of a log', () => {
  it('says that its process is ready only by the field, not by the word', () => {
    expect(saysReady('{"level":30,"ready":true,"msg":"web process listens"}')).toBe(true);
    expect(saysReady('{"level":30,"msg":"\\"ready\\":true"}')).toBe(false);
    expect(saysReady('"ready":true')).toBe(false);
  });

  it('tells problems with their cause and keeps quiet about the rest', () => {
    expect(problemIn('{"level":50,"msg":"import failed","err":{"message":"disk full"}}')).toBe(
      'import failed: disk full',
    );
    expect(problemIn('{"level":60,"msg":"cannot listen"}')).toBe('cannot listen');
    expect(problemIn('{"level":40,"msg":"idle connection lost"}')).toBeNull();
    expect(problemIn('{"level":50')).toBeNull();
    expect(problemIn('Error: plain text')).toBeNull();
  });
});
