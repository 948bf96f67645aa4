import { runCommand } from './run-command.mjs';
import { PlainFailure, say } from './step.mjs';

/** Installs a Debian package; only root can, anybody else is told the command. */
export async function installDebianPackage(name, purpose) {
  const byHand = `apt-get install -y --no-install-recommends ${name}`;
  if (process.getuid?.() !== 0) {
    throw new PlainFailure(
      `${purpose} is not installed, and only the administrator can install it.`,
      `Run: sudo ${byHand}`,
    );
  }
  say(`Installing ${purpose} from Debian …`);
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  const wait = ['-o', 'DPkg::Lock::Timeout=180', '-qq'];
  await runCommand('apt-get', [...wait, 'update'], { env });
  const { code, output } = await runCommand(
    'apt-get',
    [...wait, 'install', '-y', '--no-install-recommends', name],
    { env },
  );
  if (code === 0) return;
  throw new PlainFailure(
    `${purpose} could not be installed.`,
    `Run it by hand to see why: ${byHand}`,
    output,
  );
}
