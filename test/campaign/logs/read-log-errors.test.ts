import { symlinkSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { expect, test } from 'vitest';
import { readLog } from '../../../src/campaign/read-log.js';
import { folderWith, messageFrom } from '../folder.js';
import { layoutFrom, NUMBERED, readText, TAGGED, WIDE, walkOf } from './layouts.js';

const HEADER = 't,ax,ay,az,gx,gy,gz\n';
const ZIPPED = gzipSync(`${HEADER}${'0,1,2,3,4,5,6\n'.repeat(50)}`);
const damaged = Buffer.from(ZIPPED);
damaged[20]! ^= 0xff;

test.each([
  ['an empty file', '', WIDE, 'logs/a1.csv: is empty'],
  ['a header alone', HEADER, WIDE, 'logs/a1.csv: no accelerometer readings'],
  [
    'text in a number column',
    `${HEADER}0,1,2,3,4,5,6\n\n1,1,abc,3,4,5,6\n`,
    WIDE,
    'logs/a1.csv row 4 column ay: "abc" is not a number',
  ],
  [
    'text in the time column',
    `${HEADER}12:30,1,2,3,4,5,6\n`,
    WIDE,
    'logs/a1.csv row 2 column t: "12:30" is not a number',
  ],
  ['hexadecimal', `${HEADER}0,0x10,2,3,4,5,6\n`, WIDE, 'logs/a1.csv row 2 column ax: "0x10" is not a number'],
  [
    'infinity',
    `${HEADER}0,Infinity,2,3,4,5,6\n`,
    WIDE,
    'logs/a1.csv row 2 column ax: "Infinity" is not a number',
  ],
  ['overflow', `${HEADER}0,1e999,2,3,4,5,6\n`, WIDE, 'logs/a1.csv row 2 column ax: "1e999" is not a number'],
  [
    'two points',
    `${HEADER}0,1.2.3,2,3,4,5,6\n`,
    WIDE,
    'logs/a1.csv row 2 column ax: "1.2.3" is not a number',
  ],
  ['a lone sign', `${HEADER}0,-,2,3,4,5,6\n`, WIDE, 'logs/a1.csv row 2 column ax: "-" is not a number'],
  ['a lone point', `${HEADER}0,.,2,3,4,5,6\n`, WIDE, 'logs/a1.csv row 2 column ax: "." is not a number'],
  [
    'a decimal comma that comes late',
    `t;ax;ay;az;gx;gy;gz\n${'0;1;2;3;4;5;6\n'.repeat(30)}9;1,5;2;3;4;5;6\n`,
    WIDE,
    `logs/a1.csv row 32 column ax: "1,5" is not a number; where the file has decimal commas, say decimal: ',' in its layout`,
  ],
  [
    'a misnamed column',
    't,ax,ay,az,gyro_x,gy,gz\n',
    WIDE,
    'logs/a1.csv: no column "gx"; it has t, ax, ay, az, gyro_x, gy, gz.',
  ],
  [
    'a column in other case',
    'T,ax,ay,az,gx,gy,gz\n',
    WIDE,
    'logs/a1.csv: no column "t"; it has T, ax, ay, az, gx, gy, gz. Did you mean "T"?',
  ],
  [
    'a column twice',
    't,ax,ay,az,gx,gy,gz,ax\n',
    WIDE,
    'logs/a1.csv: column "ax" is there twice; give columns by number from 1 in the layout',
  ],
  [
    'no header where the layout has names',
    '0,1,2,3,4,5,6\n',
    WIDE,
    'logs/a1.csv: no column "t", as its first line has numbers instead of names; give columns by number from 1 in the layout',
  ],
  [
    'a column number beyond the header',
    't,ax\n0,1\n',
    NUMBERED,
    'logs/a1.csv: no column 3; it has 2 columns',
  ],
  [
    'a row cut off',
    `${HEADER}0,1,2,3,4,5,6\n1,1,2`,
    WIDE,
    'logs/a1.csv row 3: has 3 fields, the layout needs 4; mend or remove the row',
  ],
  [
    'no row of the accelerometer',
    't,sensor,x,y,z\n0,ACC,1,2,3\n0,gyr,1,2,3\n',
    TAGGED,
    'logs/a1.csv: no accelerometer readings; no row has "acc" in column sensor, there are ACC, gyr. Did you mean "ACC"?',
  ],
  [
    'no whole row of the accelerometer',
    `${HEADER}0,NaN,2,3,4,5,6\n1,NaN,2,3,4,5,6\n`,
    WIDE,
    'logs/a1.csv: no accelerometer readings; 2 rows lack the time or one of ax, ay, az',
  ],
  [
    'a quote never closed',
    `${HEADER}0,"1,2,3,4,5,6\n1,1,2,3\n`,
    WIDE,
    'logs/a1.csv row 2: a quote is opened and never closed',
  ],
  [
    'text after a quote',
    `${HEADER}0,"1"x,2,3,4,5,6\n`,
    WIDE,
    'logs/a1.csv row 2: text follows a closing quote; double the quotes inside a quoted field',
  ],
  [
    'a line without end',
    `${HEADER}${'1'.repeat(1_200_000)}`,
    WIDE,
    'logs/a1.csv row 2: the line is longer than 1 MB; this is not a CSV log',
  ],
  [
    'gzip cut short',
    ZIPPED.subarray(0, -12),
    WIDE,
    'logs/a1.csv: its gzip data ends too early; copy the file again',
  ],
])('%s', async (_, content, layout, message) => {
  expect(await messageFrom(() => readText(content, layout))).toBe(message);
});

test('damaged gzip', async () => {
  // The rest of the message is zlib's own.
  expect(await messageFrom(() => readText(damaged, WIDE))).toMatch(
    /^logs\/a1\.csv: its gzip data is damaged \(.+\); copy the file again$/,
  );
});

test('bytes that are no text', async () => {
  const bytes = Uint8Array.from({ length: 3000 }, (_, i) => (i * 197 + (i >> 3)) % 251);
  expect(await messageFrom(() => readText(bytes, WIDE))).toMatch(/^logs\/a1\.csv/);
});

test('a log that is not there, is a folder, or lies outside', async () => {
  const outside = folderWith({ 'x.csv': HEADER });
  const dir = folderWith({ 'logs/folder/x.csv': '' });
  symlinkSync(join(outside, 'x.csv'), join(dir, 'logs/link.csv'));
  const read = (log: string) => messageFrom(() => readLog(dir, walkOf(log), WIDE));
  expect(await read('logs/none.csv')).toBe(
    'logs/none.csv: there is no such file; put the log there, or mend its path in walks.csv',
  );
  expect(await read('logs/folder')).toBe(
    'logs/folder: is a folder; only a split layout reads one, other layouts need the file',
  );
  expect(await read('logs/link.csv')).toBe(
    'walk a1 log: "logs/link.csv" is a link that leads out of the campaign folder; use a path below the campaign folder',
  );
  const split = layoutFrom(
    '{ shape: split, time: { column: t, unit: ns }, accel: { file: ../../../x.csv, columns: [x, y, z], unit: mps2 } }',
  );
  expect(await messageFrom(() => readLog(dir, walkOf('logs'), split))).toBe(
    'walk a1 log: "logs/../../../x.csv" climbs out with ".."; use a path below the campaign folder',
  );
});
