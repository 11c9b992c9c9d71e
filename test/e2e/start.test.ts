import { spawn } from 'node:child_process';
import { createServer } from 'node:http';
import { afterEach, describe, expect, it } from 'vitest';
import { listen } from '../../src/cli/file-server.mjs';

const endings: (() => void)[] = [];
afterEach(() => {
  while (endings.length > 0) endings.pop()!();
});

/** Starts the app as `npm start` does and waits for its address. */
async function start(port: number) {
  const child = spawn(process.execPath, ['src/cli/start.mjs', '--port', String(port)]);
  endings.push(() => child.kill('SIGKILL'));
  let output = '';
  child.stderr.on('data', (data: Buffer) => (output += data.toString()));
  const url = await new Promise<string>((resolve, reject) => {
    child.stdout.on('data', (data: Buffer) => {
      output += data.toString();
      const match = /runs at (http:\/\/127\.0\.0\.1:\d+\/)/.exec(output);
      if (match) resolve(match[1]!);
    });
    child.on('exit', () => reject(new Error(output)));
  });
  const ended = new Promise<number | null>((resolve) => child.on('exit', resolve));
  return { child, url, ended, output: () => output };
}

async function freePort(): Promise<number> {
  const probe = createServer();
  const port = await listen(probe, 0);
  await new Promise((resolve) => probe.close(resolve));
  return port;
}

describe('npm start', () => {
  it('serves the app, says where and what next, and ends cleanly on Ctrl-C', async () => {
    const { child, url, ended, output } = await start(await freePort());
    const response = await fetch(url);
    expect(response.status).toBe(200);
    expect(await response.text()).toContain('<title>Thrumbook</title>');
    expect(output()).toContain('practice rig');
    child.kill('SIGINT');
    expect(await ended).toBe(0);
    expect(output()).toContain('Stopped.');
  });

  it('says when its port is taken and that another port has other readings', async () => {
    const other = createServer();
    const port = await listen(other, 0);
    endings.push(() => other.close());
    const { url, output } = await start(port);
    expect(url).not.toContain(`:${port}/`);
    expect(output()).toContain(`Port ${port} is taken`);
  });
});
