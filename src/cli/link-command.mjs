import { chmodSync, mkdirSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

/**
 * Last step of the build: makes `npx ellipsite` find this checkout's own command, which npm links for packages that
 * depend on it but not for the package itself.
 */
const bin = new URL('../../node_modules/.bin/', import.meta.url);
mkdirSync(bin, { recursive: true });
const target = '../../dist/cli/main.js';
const unix = `#!/bin/sh\nexec node "$(dirname "$0")/${target}" "$@"\n`;
const windows = `@node "%~dp0\\${target.replaceAll('/', '\\')}" %*\r\n`;
writeFileSync(new URL('ellipsite', bin), unix);
writeFileSync(new URL('ellipsite.cmd', bin), windows);
chmodSync(fileURLToPath(new URL('ellipsite', bin)), 0o755);
