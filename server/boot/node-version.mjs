import { PlainFailure } from './step.mjs';

/** True for the Node releases the pinned packages run on: 20.19 and later of 20, or 22.12 and later. */
export function isSupportedNode(version) {
  const [major, minor] = version.split('.').map(Number);
  if (major === 20) return minor >= 19;
  return major > 22 || (major === 22 && minor >= 12);
}

export function checkNodeVersion(version = process.versions.node) {
  if (isSupportedNode(version)) return;
  throw new PlainFailure(
    `Node ${version} is too old, or a release between the supported ones.`,
    'Install Node 20.19 or later of the 20 series, or Node 22.12 or later, and start again.',
  );
}
