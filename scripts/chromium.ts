import { execFileSync } from 'node:child_process';
import { accessSync, constants, existsSync } from 'node:fs';
import path from 'node:path';

const onPath = (name: string): string[] =>
  (process.env.PATH ?? '').split(path.delimiter).map((folder) => path.join(folder, name));

const usualPlaces = (): string[] => {
  if (process.platform === 'darwin') {
    return ['/Applications', path.join(process.env.HOME ?? '', 'Applications')].flatMap(
      (folder) => [
        `${folder}/Chromium.app/Contents/MacOS/Chromium`,
        `${folder}/Google Chrome.app/Contents/MacOS/Google Chrome`,
      ],
    );
  }
  if (process.platform === 'win32') {
    return ['PROGRAMFILES', 'PROGRAMFILES(X86)', 'LOCALAPPDATA'].flatMap((name) => {
      const folder = process.env[name];
      return folder
        ? [
            path.join(folder, 'Chromium', 'Application', 'chrome.exe'),
            path.join(folder, 'Google', 'Chrome', 'Application', 'chrome.exe'),
          ]
        : [];
    });
  }
  const names = ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable'];
  return names.flatMap((name) => [`/usr/bin/${name}`, ...onPath(name)]);
};

const isProgram = (file: string): boolean => {
  try {
    accessSync(file, constants.X_OK);
    return true;
  } catch {
    return false;
  }
};

const findChromium = (): string | undefined => {
  const told = process.env.CHROMIUM_PATH;
  if (told) {
    if (!isProgram(told)) throw new Error(`CHROMIUM_PATH says ${told}, where there is no program.`);
    return told;
  }
  return usualPlaces().find(isProgram);
};

const mayInstall = (): boolean =>
  existsSync('/etc/debian_version') &&
  process.getuid?.() === 0 &&
  onPath('apt-get').some(isProgram);

/** Where Chromium is; on a Debian machine where we are root, installed if it is missing. */
export const chromium = (): string => {
  const found = findChromium();
  if (found) return found;
  if (mayInstall()) {
    console.log('Chromium is missing; installing it with apt-get.');
    const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
    execFileSync('apt-get', ['update'], { stdio: 'inherit', env });
    const install = ['install', '-y', '--no-install-recommends', 'chromium'];
    execFileSync('apt-get', install, { stdio: 'inherit', env });
    const installed = findChromium();
    if (installed) return installed;
  }
  throw new Error(
    'The browser tests need Chromium, and none was found. Install Chromium or Google Chrome ' +
      '(on Debian and Ubuntu: sudo apt-get install chromium), or set CHROMIUM_PATH to where it is.',
  );
};
