import type { VersionDetail } from '@/api-types/versions';
import { layoutShortNumber } from './version-plan';

/** Letters of the Latin script that have no mark to take off, and how they are written without. */
const PLAIN_LETTERS: Readonly<Record<string, string>> = {
  ß: 'ss',
  æ: 'ae',
  œ: 'oe',
  ø: 'o',
  đ: 'd',
  ð: 'd',
  þ: 'th',
  ħ: 'h',
  ı: 'i',
  ĸ: 'k',
  ł: 'l',
  ŋ: 'ng',
  ŧ: 't',
  ſ: 's',
  ə: 'e',
};

/** Letters kept of the project's name and of the layout's, so that neither crowds the other out. */
const PART_LENGTH = 40;

interface NamePart {
  readonly words: string;
  /** Letters were lost or cut: another name may come to the same. */
  readonly shortened: boolean;
}

function namePart(name: string): NamePart {
  const plain = name
    .toLowerCase()
    .normalize('NFD')
    .replace(/\p{M}/gu, '')
    .replace(/[^a-z0-9]/g, (letter) => PLAIN_LETTERS[letter] ?? letter);
  const words = plain.replace(/[^a-z0-9]+/g, '-').replace(/^-|-$/g, '');
  const lost = /[^\P{L}a-z]|[^\P{N}0-9]/u.test(plain);
  return {
    words: words.slice(0, PART_LENGTH).replace(/-$/, ''),
    shortened: lost || words.length > PART_LENGTH || words === '',
  };
}

/**
 * A name for a downloaded file, by project, layout and version: `back-court-diamond-chequer-v3`. Where a name loses
 * letters, the layout's own number tells it from others: `garden-abc123-v3`.
 */
export function planFileName(
  version: Pick<VersionDetail, 'projectName' | 'layoutName' | 'layoutId' | 'number'>,
): string {
  const parts = [version.projectName, version.layoutName].map(namePart);
  const words = parts.map((part) => part.words).filter(Boolean);
  const number = layoutShortNumber(version.layoutId).toLowerCase();
  return [
    ...(words.length > 0 ? words : ['plan']),
    ...(parts.some(({ shortened }) => shortened) && number !== '' ? [number] : []),
    `v${version.number}`,
  ].join('-');
}
