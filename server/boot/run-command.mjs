import { spawn } from 'node:child_process';
import { PlainFailure } from './step.mjs';

const running = new Set();

/**
 * Runs a command to its end. Resolves to `{ code, output }`; `show: true` passes its output on to the
 * terminal instead of keeping it. A command that does not exist has code 127.
 */
export function runCommand(command, args, { show = false, env = process.env, ...options } = {}) {
  return new Promise((resolve) => {
    const stdio = show ? ['ignore', 'inherit', 'inherit'] : ['ignore', 'pipe', 'pipe'];
    const child = spawn(command, args, { stdio, env, ...options });
    running.add(child);
    let output = '';
    const keep = (chunk) => (output += chunk);
    child.stdout?.setEncoding('utf8').on('data', keep);
    child.stderr?.setEncoding('utf8').on('data', keep);
    const end = (code) => {
      running.delete(child);
      resolve({ code, output });
    };
    child.on('error', (error) => {
      output += error.message;
      end(127);
    });
    child.on('close', (code) => end(code ?? 1));
  });
}

/** Runs a command that has to succeed; its output is the answer. */
export async function mustRun(what, advice, command, args, options) {
  const { code, output } = await runCommand(command, args, options);
  if (code !== 0) throw new PlainFailure(`${what} failed (exit code ${code}).`, advice, output);
  return output;
}

/** Ends the commands under way, when the launch itself is asked to stop. */
export function endRunningCommands() {
  for (const child of running) child.kill('SIGTERM');
}
