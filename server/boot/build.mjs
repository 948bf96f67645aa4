import {
  cpSync,
  existsSync,
  mkdirSync,
  readFileSync,
  readdirSync,
  renameSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import path from 'node:path';
import { checkNodeVersion } from './node-version.mjs';
import { ensurePackages } from './npm-packages.mjs';
import { inProject, isEntryPoint, sha256 } from './project.mjs';
import { mustRun } from './run-command.mjs';
import { say, step, tellFailure } from './step.mjs';

const entries = {
  main: 'server/main.ts',
  migrate: 'server/migrate.ts',
  'stripe-mock': 'server/stripe-mock/main.ts',
  'mail-stand-in': 'server/mail-stand-in/main.ts',
};
// Read at run time from beside the bundle, as they are from beside the source.
const besideBundle = ['server/stand-in-look/look.css'];
const clientSources = ['client', 'assets', 'server/contracts', 'server/engine', 'server/domain'];
const serverSources = ['server', 'migrations', 'seeds'];
const settings = ['package-lock.json', 'vite.config.ts', 'tsconfig.json'];

/** Builds what has changed since the last build: the client by Vite, the server by esbuild. */
export async function build() {
  const stamp = `${process.pid}`;
  await rebuild('client', [...clientSources, ...settings], () => buildClient(`client-${stamp}`));
  await rebuild('server', [...serverSources, ...settings], () => buildServer(`server-${stamp}`));
}

async function rebuild(name, sources, work) {
  const fingerprint = fingerprintOf(sources);
  const stampFile = inProject('dist', `${name}.stamp`);
  const built = inProject('dist', name);
  if (existsSync(built) && existsSync(stampFile)) {
    if (readFileSync(stampFile, 'utf8') === fingerprint) return;
  }
  say(`Building the ${name} …`);
  mkdirSync(inProject('dist'), { recursive: true });
  const fresh = await work();
  rmSync(built, { recursive: true, force: true });
  renameSync(fresh, built);
  writeFileSync(stampFile, fingerprint);
}

/** A fingerprint of names and contents of all files in the given places. */
export function fingerprintOf(places, root = inProject()) {
  const files = places.flatMap((place) => filesIn(root, place)).sort();
  return sha256(...files.flatMap((file) => [file, '\0', readFileSync(path.join(root, file))]));
}

function filesIn(root, place) {
  const full = path.join(root, place);
  if (!existsSync(full)) return [];
  if (!statSync(full).isDirectory()) return [place];
  return readdirSync(full).flatMap((name) => filesIn(root, path.join(place, name)));
}

async function buildClient(name) {
  const folder = inProject('dist', name);
  await mustRun(
    'Building the client',
    'Mend the file the message names.',
    process.execPath,
    // prettier-ignore
    [inProject('node_modules/vite/bin/vite.js'), 'build', '--outDir', folder, '--emptyOutDir', '--logLevel', 'warn'],
    { cwd: inProject(), env: { ...process.env, NO_COLOR: '1', FORCE_COLOR: '0' } },
  );
  return folder;
}

async function buildServer(name) {
  const { build: bundle } = await import('esbuild');
  const folder = inProject('dist', name);
  await step('Building the server', 'Mend the file the message names.', () =>
    bundle({
      absWorkingDir: inProject(),
      entryPoints: entries,
      outdir: folder,
      platform: 'node',
      target: 'node20',
      format: 'esm',
      bundle: true,
      packages: 'external',
      sourcemap: true,
      logLevel: 'silent',
    }),
  );
  for (const file of besideBundle) cpSync(inProject(file), path.join(folder, path.basename(file)));
  return folder;
}

if (isEntryPoint(import.meta.url)) {
  try {
    checkNodeVersion();
    await ensurePackages();
    await build();
    say('Built into dist/.');
  } catch (error) {
    tellFailure(error);
    process.exitCode = 1;
  }
}
