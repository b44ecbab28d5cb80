import * as z from "zod";
import { modes as builtInModes, type Mode } from "../receiver/modes.ts";
import { dishSchema, feedSchema } from "./antennaSchema.ts";
import { climateSchema } from "./climateSchema.ts";
import { coverSchema } from "./coverSchema.ts";
import { distributionDefinitions } from "./distributionJson.ts";
import { group, named, oneOf, text } from "./fields.ts";
import { pathSchema } from "./pathSchema.ts";
import { quantity, uncertain } from "./quantityField.ts";
import { spreadSchema } from "./spreadSchema.ts";
import { stationFields } from "./stationFields.ts";
import type { Scenario, Uncertain } from "./types.ts";
import { weatherSchema } from "./weatherSchema.ts";
import { instead } from "./wording.ts";

/** The cover that every scenario has. */
export const BARE = "bare";

const someModes = `${Object.keys(builtInModes).join(", ")} or one of your own`;

const endShape = {
  feed: text("the name of a feed"),
  dish: text("the name of a dish; without one the feed radiates by itself").optional(),
  cover: text("the name of the cover on the feed's mouth").optional(),
  dish_cover: text("the name of a cover over the whole dish").optional(),
  line_loss: uncertain("levelDb", { about: "loss of line and joints", range: [0, 60] }).optional(),
};

const end = ({
  feed,
  dish,
  cover = BARE,
  dish_cover: dishCover,
  line_loss: lineLossDb = { value: 0 },
}: {
  feed: string;
  dish?: string | undefined;
  cover?: string | undefined;
  dish_cover?: string | undefined;
  line_loss?: Uncertain | undefined;
}) => ({ feed, dish, cover, dishCover, lineLossDb });

const transmitter = group(
  { power: uncertain("powerDbm", stationFields.power), ...endShape },
  "the transmitter: power, feed, dish, cover, line_loss",
).transform(({ power: powerDbm, ...rest }) => ({ powerDbm, ...end(rest) }));

const receiver = group(
  {
    noise_figure: uncertain("levelDb", stationFields.noiseFigure),
    antenna_temperature: uncertain("temperatureK", {
      about: "noise temperature of what the antenna sees in dry weather",
      range: [2.7, 10000],
    }).optional(),
    mode: z
      .union(
        [
          text("the name of a mode").transform((mode) => [mode]),
          z
            .array(text("the name of a mode"))
            .min(1, `an empty list, expected one mode or more: ${someModes}`),
        ],
        { error: ({ input }) => instead(input, `a mode or a list of modes: ${someModes}`) },
      )
      .meta({ description: `mode of the receiver, or a list of modes: ${someModes}` })
      .optional(),
    ...endShape,
  },
  "the receiver: noise_figure, mode, feed, dish, cover, line_loss",
).transform(({ noise_figure, antenna_temperature, mode = ["cw"], ...rest }) => ({
  noiseFigureDb: noise_figure,
  antennaTemperatureK: antenna_temperature,
  modes: mode,
  ...end(rest),
}));

const hertz = (about: string) => quantity("bandwidthHz", { about, range: [0.001, 1e9] });

const mode = group(
  {
    bandwidth: hertz("noise bandwidth of the receiver"),
    required_snr: quantity("levelDb", { about: "signal to noise ratio needed", range: [-60, 60] }),
    reference_bandwidth: hertz("bandwidth in which required_snr is stated").optional(),
    spread: quantity("levelDb", { about: "1-sigma spread of the threshold", range: [0, 20] }).optional(),
  },
  "a mode: bandwidth, required_snr and the bandwidth it is stated in",
).transform(
  ({
    bandwidth,
    required_snr,
    reference_bandwidth = bandwidth,
    spread = 1,
  }): Omit<Mode, "name" | "label"> => ({
    noiseBandwidthHz: bandwidth,
    requiredSnrDb: required_snr,
    referenceBandwidthHz: reference_bandwidth,
    sigmaDb: spread,
    source: "scenario",
  }),
);

const decision = group(
  {
    reserve: quantity("levelDb", { about: "margin to keep in hand", range: [0, 60] }).optional(),
    confidence: quantity("percent", {
      about: "probability wanted that the margin holds",
      range: [50, 99.99],
    }).optional(),
  },
  "the decision: reserve and confidence",
).transform(({ reserve = 3, confidence = 90 }) => ({ reserveDb: reserve, confidence: confidence / 100 }));

/** The whole scenario file. Names that refer to each other are checked by `references.ts`. */
export const scenarioSchema = group(
  {
    title: text("the title of the scenario"),
    frequency: quantity("frequencyGHz", { about: "frequency", range: [1, 350] }),
    polarization: oneOf(["horizontal", "vertical", "circular"], "polarization of both ends").optional(),
    transmitter,
    receiver,
    feeds: named(feedSchema, "the feeds"),
    covers: named(coverSchema, "the covers").optional(),
    dish: named(dishSchema, "the dishes").optional(),
    modes: named(mode, "modes of your own").optional(),
    path: pathSchema,
    weather: named(weatherSchema, "the weathers").optional(),
    climate: climateSchema.optional(),
    decision: decision.optional(),
    spread: spreadSchema.optional(),
  },
  "a scenario: title, frequency, transmitter, receiver, feeds, path and more",
).transform(
  ({
    frequency,
    polarization = "horizontal",
    covers,
    dish = {},
    modes = {},
    weather,
    decision,
    ...rest
  }): Scenario => {
    const own = Object.entries(modes).map(([name, mode]) => [name, { name, label: name, ...mode }]);
    return {
      ...rest,
      frequencyGHz: frequency,
      polarization,
      dish,
      covers: { [BARE]: coverSchema.parse({}), ...covers },
      modes: { ...builtInModes, ...Object.fromEntries(own) },
      weather: weather && Object.keys(weather).length > 0 ? weather : { dry: weatherSchema.parse({}) },
      decision: decision ?? { reserveDb: 3, confidence: 0.9 },
    };
  },
);

/** JSON Schema of the file as it is typed, for editors. */
export function scenarioJsonSchema(): object {
  const schema = z.toJSONSchema(scenarioSchema, { io: "input", target: "draft-7", reused: "inline" });
  return { title: "Oilskin scenario", ...schema, definitions: distributionDefinitions() };
}
