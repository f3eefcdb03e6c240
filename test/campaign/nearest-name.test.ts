import { expect, test } from 'vitest';
import { didYouMean, listNames, nearestName } from '../../src/campaign/nearest-name.js';

test('nearestName: one slip in three characters, swaps counting once; case and separators aside', () => {
  expect(nearestName('heigth_m', ['height_m', 'leg_m'])).toBe('height_m');
  expect(nearestName('Height M', ['leg_m', 'height_m'])).toBe('height_m');
  expect(nearestName('G', ['mps2', 'g'])).toBe('g');
  expect(nearestName('ab', ['xy', 'ac'])).toBeNull();
  expect(nearestName('recorder-c', ['recorder-a', 'recorder-b'])).toBe('recorder-a');
  expect(nearestName('', ['a'])).toBeNull();
});

test('didYouMean and listNames: the ends of messages', () => {
  expect(didYouMean('gyr', ['gyro'])).toBe(' Did you mean "gyro"?');
  expect(didYouMean('lux', ['gyro'])).toBe('');
  expect(listNames([])).toBe('(none)');
  expect(listNames(Array.from({ length: 14 }, (_, i) => i))).toBe(
    '0, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11 and 2 more',
  );
});
