import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { existsSync, mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { takeDataLock } from '@/prisma/launch/data-lock.mjs';

const ABOUT = { address: 'http://localhost:3000' };

let folder: string;
let path: string;
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'elbowroom-lock-'));
  path = join(folder, 'lock');
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

async function withOtherProcess(work: (pid: number) => Promise<void>): Promise<void> {
  const other = spawn(process.execPath, ['-e', 'setInterval(() => {}, 1000)'], { stdio: 'ignore' });
  try {
    await once(other, 'spawn');
    await work(other.pid!);
  } finally {
    other.kill('SIGKILL');
  }
}

it('is a file that only this account can read, gone once given back', async () => {
  const giveBack = await takeDataLock(folder, ABOUT);
  expect(statSync(path).mode & 0o777).toBe(0o600);
  expect(JSON.parse(readFileSync(path, 'utf8'))).toMatchObject({ pid: process.pid, ...ABOUT });
  giveBack();
  expect(existsSync(path)).toBe(false);
});

it('of a process that runs is refused in one sentence that names it', async () => {
  await withOtherProcess(async (pid) => {
    writeFileSync(path, JSON.stringify({ pid, started: null, token: 'x', ...ABOUT }));
    await expect(takeDataLock(folder, ABOUT)).rejects.toThrow(
      new RegExp(
        `^The data folder ${folder} is in use .*process ${pid}, http://localhost:3000.*DATA_DIR.*\\.$`,
      ),
    );
  });
});

it('of a process that was killed is taken over', async () => {
  let pid = 0;
  await withOtherProcess(async (other) => {
    pid = other;
  });
  await expect.poll(() => isGone(pid)).toBe(true);
  writeFileSync(path, JSON.stringify({ pid, started: null, token: 'x', ...ABOUT }));
  const giveBack = await takeDataLock(folder, ABOUT);
  giveBack();
});

it.runIf(existsSync('/proc/self/stat'))(
  'whose process number went to another program is taken over',
  async () => {
    await withOtherProcess(async (pid) => {
      writeFileSync(path, JSON.stringify({ pid, started: '1', token: 'x', ...ABOUT }));
      const giveBack = await takeDataLock(folder, ABOUT);
      giveBack();
    });
  },
);

it("that cannot be read is nobody's", async () => {
  writeFileSync(path, 'half a lo');
  const giveBack = await takeDataLock(folder, ABOUT);
  giveBack();
});

it('goes to one of several that ask for it at the same moment', async () => {
  const ends = await Promise.allSettled(Array.from({ length: 5 }, () => takeDataLock(folder, ABOUT)));
  expect(ends.filter((end) => end.status === 'fulfilled')).toHaveLength(1);
});

function isGone(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return false;
  } catch {
    return true;
  }
}
