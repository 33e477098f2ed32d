import type { BoreSheet } from '../bore-sheet';
import { axesOf, depthsOf } from '../places';

/**
 * What the sheet of one bore lacks, in words. A full sheet has a reading on every axis at every depth,
 * at two depths and on two axes at least, the lifter where its size is needed, and both zeros or none.
 */
export const missingOf = (sheet: BoreSheet): readonly string[] => {
  const depths = depthsOf(sheet.bore);
  const axes = axesOf(sheet.bore);
  const read = new Set(
    sheet.bore.flatMap(({ depth, axis, reading }) =>
      reading === null ? [] : [`${depth}, ${axis}`],
    ),
  );
  const { opening, closing } = sheet.zeros ?? {};
  const needsLifter = sheet.method === 'absolute' || sheet.zeroSize !== undefined;
  return [
    ...(read.size === 0 ? ['bore readings'] : []),
    ...(needsLifter && sheet.lifter.length === 0 ? ['lifter diameter'] : []),
    ...depths.flatMap((depth) =>
      axes.map((axis) => `${depth}, ${axis}`).filter((place) => read.size > 0 && !read.has(place)),
    ),
    ...(depths.length === 1 ? ['a second depth'] : []),
    ...(axes.length === 1 ? ['a second axis'] : []),
    ...(opening !== undefined && closing === undefined ? ['closing zero'] : []),
    ...(opening === undefined && closing !== undefined ? ['opening zero'] : []),
  ];
};
