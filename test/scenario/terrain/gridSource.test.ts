import { expect, it } from "vitest";
import { gridSource } from "../../../src/scenario/terrain/gridSource.ts";

/** Grids one degree wide along the equator, each as high as its number; number 3 does not exist. */
function counted(mostGrids: number) {
  const reads: number[] = [];
  const source = gridSource({
    name: "made",
    stepM: 1,
    mostGrids,
    keyAt: (_, longitude) => Math.floor(longitude),
    nameOf: (key) => `grid ${key}`,
    read: async (key) => {
      reads.push(key);
      if (key === 3) return undefined;
      const heightsM = [key, key, key, key];
      const shape = { rows: 2, columns: 2, north: 1, west: key, rowsPerDegree: 1, columnsPerDegree: 1 };
      return { heightsM, ...shape, voidM: -1 };
    },
  });
  const at = async (...longitudes: number[]) => [
    ...(
      await source.heightsAt(
        longitudes.map(() => 0.5),
        longitudes,
      )
    ).heightsM,
  ];
  return { source, reads, at };
}

it("reads no grid twice while it is kept, and gives up the one longest unused", async () => {
  const { reads, at } = counted(2);
  expect(await at(0.1, 0.9, 1.5, 0.2)).toEqual([0, 0, 1, 0]);
  expect(await at(1.1)).toEqual([1]);
  expect(reads).toEqual([0, 1]);
  await at(2.5); // grid 0 goes, being unused for longer than 1
  await at(1.5, 2.5);
  expect(reads).toEqual([0, 1, 2]);
  await at(0.5);
  expect(reads).toEqual([0, 1, 2, 0]);
});

it("does not let a missing grid push out one that is there", async () => {
  const { source, reads, at } = counted(1);
  await at(0.5, 3.5, 0.5);
  expect(reads).toEqual([0, 3]);
  const { unknown } = await source.heightsAt([0, 0, 0], [-1.5, 0.5, 3.5]);
  expect([...unknown]).toEqual([
    [0, { reason: "outside", source: "made" }],
    [2, { reason: "no tile", source: "grid 3" }],
  ]);
});
