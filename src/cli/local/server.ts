import { type ChildProcess, spawn } from 'node:child_process';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { holdBuild, serverEntry } from './build';
import { ROOT } from './places';

const SERVE = path.join(ROOT, 'src', 'cli', 'serve.mjs');

export interface ServerOptions {
  readonly build: string;
  readonly host: string;
  readonly port: number;
  readonly databaseUrl: string;
  readonly authSecret: string;
  readonly environment?: Record<string, string | undefined>;
  /** Where the server's log goes; `collect` keeps it for `log()`. */
  readonly output: 'inherit' | 'collect';
}

export interface RunningServer {
  readonly url: string;
  readonly child: ChildProcess;
  /** What it has written so far, when collected. */
  readonly log: () => string;
  readonly stop: () => Promise<void>;
}

async function isHealthy(url: string): Promise<boolean> {
  try {
    return (await fetch(`${url}/api/v1/health`, { signal: AbortSignal.timeout(2000) })).ok;
  } catch {
    return false;
  }
}

/** Starts the built site and waits until it and its database answer. */
export async function startServer(options: ServerOptions): Promise<RunningServer> {
  const { host, port } = options;
  let written = '';
  const child = spawn(process.execPath, ['--enable-source-maps', SERVE, serverEntry(options.build)], {
    cwd: ROOT,
    stdio: [
      'ignore',
      ...(options.output === 'inherit' ? (['ignore', 'inherit'] as const) : (['pipe', 'pipe'] as const)),
    ],
    env: {
      ...process.env,
      ...options.environment,
      NODE_ENV: 'production',
      HOST: host,
      PORT: String(port),
      DATABASE_URL: options.databaseUrl,
      AUTH_SECRET: options.authSecret,
    },
    // Ctrl-C reaches only the command, which then stops the server in its own order.
    detached: true,
  });
  if (child.pid !== undefined) holdBuild(options.build, child.pid);
  child.stdout?.on('data', (part) => {
    written += part;
  });
  child.stderr?.on('data', (part) => {
    written += part;
  });
  const shown = host === '0.0.0.0' || host === '::' ? '127.0.0.1' : host;
  const url = `http://${shown.includes(':') ? `[${shown}]` : shown}:${port}`;
  const stop = async (): Promise<void> => {
    if (child.exitCode !== null || child.signalCode !== null) return;
    const gone = new Promise((resolve) => child.once('exit', resolve));
    child.kill('SIGTERM');
    const late = setTimeout(() => child.kill('SIGKILL'), 3000);
    await gone;
    clearTimeout(late);
  };
  for (let tries = 0; tries < 300; tries += 1) {
    if (child.exitCode !== null) throw new Error(`The server ended at once:\n${written}`);
    if (await isHealthy(url)) return { url, child, log: () => written, stop };
    await sleep(100);
  }
  await stop();
  throw new Error(`The server did not answer at ${url} within 30 s:\n${written}`);
}
