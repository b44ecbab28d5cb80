/** Ways to reckon the water on a cover: a closed film, drops, or a published wet-antenna model by name. */
export const wetModels = [
  "film",
  "beads",
  "leijnse2008",
  "pastorek2022",
  "kharadly2001",
  "merceret2000",
  "schleiss2013",
  "constant",
] as const;

export type WetModel = (typeof wetModels)[number];
