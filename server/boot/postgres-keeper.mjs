// The parent of the database server: stops it cleanly when asked, or when the launcher is gone.
import { spawn } from 'node:child_process';
import { rmSync } from 'node:fs';

const { program, args, account, throwAway } = JSON.parse(process.argv[2]);
const server = spawn(program, args, {
  ...account,
  cwd: '/',
  stdio: ['ignore', 'inherit', 'inherit'],
});

const stop = () => server.kill('SIGINT');
process.on('SIGTERM', stop);
process.on('SIGINT', stop);
process.on('SIGHUP', stop);
server.once('error', (error) => {
  process.stderr.write(`${error.message}\n`);
  process.exitCode = 1;
});
server.once('exit', (code) => {
  for (const folder of throwAway) rmSync(folder, { recursive: true, force: true });
  process.exit(code ?? 1);
});
