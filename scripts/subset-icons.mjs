// Cuts the icon font to the icons named in src/app/ui/icon/icon-names.ts: 128 kB become a few.
import { readFileSync, writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import subsetFont from 'subset-font';

const root = new URL('../', import.meta.url);
const names = readFileSync(new URL('src/app/ui/icon/icon-names.ts', root), 'utf8');
const characters = [...names.matchAll(/'\\u([0-9a-f]{4})'/g)].map(([, hex = '']) =>
  String.fromCharCode(Number.parseInt(hex, 16)),
);
const whole = fileURLToPath(
  import.meta.resolve('@fontsource/material-icons/files/material-icons-latin-400-normal.woff2'),
);
const cut = await subsetFont(readFileSync(whole), characters.join(''), {
  targetFormat: 'woff2',
  noLayoutClosure: true,
});
writeFileSync(new URL('src/styles/plimsoll-icons.woff2', root), cut);
console.log(`${characters.length} icons, ${cut.length} bytes`);
