/** Which of the file's axes each device axis is, with its sign. */
export type AxisMap = readonly { axis: number; sign: number }[];

export const IDENTITY: AxisMap = [0, 1, 2].map((axis) => ({ axis, sign: 1 }));

/** All orders and signs of three axes, left-handed ones too. */
export const AXIS_MAPS: readonly AxisMap[] = [
  [0, 1, 2],
  [1, 0, 2],
  [0, 2, 1],
  [2, 1, 0],
  [1, 2, 0],
  [2, 0, 1],
].flatMap((order) =>
  [0, 1, 2, 3, 4, 5, 6, 7].map((bits) => order.map((axis, k) => ({ axis, sign: (bits >> k) & 1 ? -1 : 1 }))),
);

/** As a layout's `axes` writes it. */
export function axesText(map: AxisMap): string {
  return map.map(({ axis, sign }) => `${sign < 0 ? '-' : ''}${'xyz'[axis]}`).join(', ');
}
