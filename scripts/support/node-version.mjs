import { Refusal } from './refusal.mjs';

/** The first version that loads what the packages are made of. */
const oldest = [20, 19];

/**
 * @param {string} version such as 20.19.0
 * @throws {Refusal} when it is too old
 */
export function checkNodeVersion(version) {
  const [major, minor] = version.split('.').map(Number);
  if (major > oldest[0] || (major === oldest[0] && minor >= oldest[1])) return;
  throw new Refusal(`Keepstep needs Node.js ${oldest.join('.')} or newer; this is ${version}.`);
}
