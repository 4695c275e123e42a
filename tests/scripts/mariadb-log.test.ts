import { describe, expect, it } from 'vitest';
import { sentenceFromLog } from '../../scripts/support/mariadb-log.mjs';

// Lines as MariaDB 10.11.19 wrote them.
const line = (text: string) => `2026-12-01  5:11:48 0 [ERROR] ${text}`;

describe('sentenceFromLog', () => {
  it('takes the first error that is not a consequence', () => {
    const log = [
      '2026-12-01  5:11:48 0 [Note] InnoDB: Starting shutdown...',
      line("Plugin 'InnoDB' registration as a STORAGE ENGINE failed."),
      line("Can't start server: Bind on TCP/IP port. Got error: 98: Address in use"),
      line('Aborting'),
    ].join('\n');
    expect(sentenceFromLog(log)).toBe("Can't start server: Bind on TCP/IP port. Got error: 98: Address in use.");
  });

  it.each([
    'mariadbd: Disk is full writing \'./aria_log\' (Errcode: 28 "No space left on device")',
    "InnoDB: Error number 28 means 'No space left on device'",
  ])('recognises a full disk: %s', (text) => {
    expect(sentenceFromLog(line(text))).toBe('the disk is full.');
  });

  it('says when there is no reason', () => {
    expect(sentenceFromLog('')).toBe('it gave no reason.');
  });
});
