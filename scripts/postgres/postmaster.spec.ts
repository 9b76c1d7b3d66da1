import { spawn } from 'node:child_process';
import { existsSync, mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { runningServer } from './postmaster.mjs';

function folderWithPid(pid: number): string {
  const folder = mkdtempSync(join(tmpdir(), 'plimsoll-postmaster-'));
  writeFileSync(join(folder, 'postmaster.pid'), `${pid}\n${folder}\n1764590000\n25432\n`);
  return folder;
}

describe('the server of a cluster', () => {
  it('runs when its process works in the folder', () => {
    const folder = mkdtempSync(join(tmpdir(), 'plimsoll-postmaster-'));
    const child = spawn('sleep', ['30'], { cwd: folder });
    writeFileSync(join(folder, 'postmaster.pid'), `${child.pid}\n${folder}\n1764590000\n25432\n`);
    expect(runningServer(folder)).toEqual({ pid: child.pid, port: 25432 });
    child.kill();
  });

  it('does not run when its number is another program’s by now, and its note is removed', () => {
    const folder = folderWithPid(process.pid);
    expect(runningServer(folder)).toBeNull();
    expect(existsSync(join(folder, 'postmaster.pid'))).toBe(false);
  });

  it('does not run when no process has its number', () => {
    // Above the largest process number that Linux gives (4,194,304).
    expect(runningServer(folderWithPid(5_000_000))).toBeNull();
  });

  it('does not run without a note', () => {
    expect(runningServer(mkdtempSync(join(tmpdir(), 'plimsoll-postmaster-')))).toBeNull();
  });
});
