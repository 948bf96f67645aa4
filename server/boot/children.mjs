import { spawn } from 'node:child_process';
import {
  closeSync,
  existsSync,
  mkdirSync,
  openSync,
  readFileSync,
  renameSync,
  statSync,
} from 'node:fs';
import path from 'node:path';
import { PlainFailure } from './step.mjs';

const preload = new URL('./end-with-launcher.mjs', import.meta.url).href;
const graceMs = 12_000;
const largestLogBytes = 5_000_000;

/**
 * The processes a launcher owns. Each has its own process group, so that Ctrl-C reaches the launcher
 * alone, and an IPC channel whose end tells it that the launcher is gone.
 */
export class Children {
  #owned = [];
  #onLoss;
  #stopping = false;
  #closed = false;

  constructor(onLoss) {
    this.#onLoss = onLoss;
  }

  /** Starts a Node script; `logFile` takes its output, else the terminal does. */
  start(name, args, { env, logFile = null }) {
    if (this.#closed) throw new PlainFailure(`The ${name} was not started: stopping.`, '');
    const log = logFile ? openLog(logFile) : 'inherit';
    const child = spawn(process.execPath, ['--import', preload, ...args], {
      env,
      detached: true,
      stdio: ['ignore', log, log, 'ipc'],
    });
    if (logFile) closeSync(log);
    const owned = { name, child, stopped: false, ended: null };
    owned.ended = new Promise((resolve) => {
      child.once('error', () => resolve());
      child.once('exit', (code, signal) => {
        resolve();
        if (owned.stopped || this.#stopping) return;
        this.#onLoss(lossOf(name, signal ?? code, logFile));
      });
    });
    this.#owned.push(owned);
    return owned;
  }

  /** Ends one child: asked first, killed when it takes too long. */
  async stop(owned) {
    owned.stopped = true;
    if (owned.child.exitCode === null && owned.child.signalCode === null) {
      owned.child.kill('SIGTERM');
      const impatience = setTimeout(() => owned.child.kill('SIGKILL'), graceMs);
      await owned.ended;
      clearTimeout(impatience);
    }
    this.#owned = this.#owned.filter((other) => other !== owned);
  }

  /** From here on nothing is started any more. */
  closeForNew() {
    this.#closed = true;
  }

  /** Ends all, the last started first. */
  async stopAll() {
    this.#stopping = true;
    for (const owned of [...this.#owned].reverse()) await this.stop(owned);
  }
}

function lossOf(name, how, logFile) {
  return new PlainFailure(
    `The ${name} ended by itself (${how}).`,
    logFile ? `Read ${logFile}, mend the cause and start again.` : 'Start again.',
    logFile ? lastLines(logFile) : '',
  );
}

function openLog(file) {
  mkdirSync(path.dirname(file), { recursive: true });
  if (existsSync(file) && statSync(file).size > largestLogBytes) renameSync(file, `${file}.old`);
  return openSync(file, 'a');
}

function lastLines(file) {
  return readFileSync(file, 'utf8').trimEnd().split('\n').slice(-15).join('\n');
}
