import { BlockList, isIP } from 'node:net';
import type { LocalLetter, LocalLetterSummary } from '@/api-types/dev-mail';
import { environment, type Environment } from '../environment';
import { done, notFound, type Outcome } from '../outcomes';
import { listLetters, localMailFolder, readLetter } from './local-letters';

/** Addresses of this machine and of networks that the world does not reach (RFC 1918, 3927, 4193, 4291). */
const near = new BlockList();
near.addSubnet('127.0.0.0', 8);
near.addSubnet('10.0.0.0', 8);
near.addSubnet('172.16.0.0', 12);
near.addSubnet('192.168.0.0', 16);
near.addSubnet('169.254.0.0', 16);
near.addAddress('::1', 'ipv6');
near.addSubnet('fc00::', 7, 'ipv6');
near.addSubnet('fe80::', 10, 'ipv6');

const isNear = (address: string): boolean => {
  const plain = address.replace(/^::ffff:(?=\d+\.)/i, '').replace(/%.*$/, '');
  const family = isIP(plain);
  return family !== 0 && near.check(plain, family === 6 ? 'ipv6' : 'ipv4');
};

/**
 * Whether letters are shown on this server: only when none are really sent. They let people in, so only
 * somebody near is shown them, and nobody on a site that has a public address but no mail server yet.
 */
export const showsLetters = (
  address: string,
  settings: Pick<Environment, 'smtpUrl' | 'publicOrigin'> = environment(),
): boolean => !settings.smtpUrl && !settings.publicOrigin && isNear(address);

const folder = () => localMailFolder(environment().dataDir);

/** The letters kept on this machine, newest first. Not found: to addresses from outside, and once letters are really sent. */
export const localLetters = async (
  address: string,
): Promise<Outcome<{ letters: LocalLetterSummary[] }>> =>
  showsLetters(address) ? done({ letters: await listLetters(folder()) }) : notFound('page');

/** One of them; not found as the list is. */
export const localLetter = async (address: string, id: string): Promise<Outcome<LocalLetter>> => {
  if (!showsLetters(address)) return notFound('page');
  const letter = await readLetter(folder(), id);
  return letter ? done(letter) : notFound('letter');
};
