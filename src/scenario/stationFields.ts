import type { FieldOptions } from "./judgedQuantity.ts";

/** What a scenario and a row of a roster both say of a station: what it means, and between which ends. */
export const stationFields = {
  ground: { about: "ground above sea level", range: [-450, 9000] },
  height: { about: "antenna above ground", range: [0, 1000] },
  power: { about: "power at the transmitter", range: [-60, 70] },
  noiseFigure: { about: "noise figure of the receiver", range: [0, 30] },
  diameter: { about: "diameter of the dish", range: [0.05, 40] },
} as const satisfies Record<string, FieldOptions>;
