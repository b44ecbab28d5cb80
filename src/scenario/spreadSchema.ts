import * as z from "zod";
import { group } from "./fields.ts";
import { quantity, uncertain } from "./quantityField.ts";
import type { SpreadSettings } from "./types.ts";

const decibels = (about: string) => quantity("levelDb", { about, range: [0, 30] }).optional();
const share = (about: string) => quantity("percent", { about, range: [0, 100] }).optional();
const between = (what: string) =>
  quantity("ratio", { about: `correlation of ${what} between the two ends`, range: [-1, 1] }).optional();

const blunder = () =>
  group(
    {
      chance: quantity("percent", { about: "chance of a blunder, 0 % for none", range: [0, 100] }),
      loss: uncertain("levelDb", { about: "what a blunder costs", range: [0, 60] }).optional(),
    },
    "a blunder: chance and loss",
  ).transform(({ chance, loss }, context) => {
    if (loss === undefined && chance > 0) {
      const message = "missing, expected what a blunder costs, such as 15 dB";
      context.addIssue({ code: "custom", message, path: ["loss"], input: loss });
      return z.NEVER;
    }
    return { chance: chance / 100, lossDb: loss ?? { value: 0 } };
  });

const correlation = () =>
  group(
    {
      water: between("the water on the covers"),
      cover: between("loss and thickness of the covers"),
      aim: between("the aim"),
      gain: between("the gain"),
      return_loss: between("the feeds' return loss"),
      line: between("the line loss"),
    },
    "correlations between the two ends: water, cover, aim, gain, return_loss, line",
  ).transform(({ return_loss: returnLoss, ...rest }) => ({ ...rest, returnLoss }));

/** What scatters beside the fields that state their own spread. */
const spread = () =>
  group(
    {
      feed_return_loss: decibels("one standard deviation of the feeds' return loss"),
      cover_loss: share("one standard deviation of what a dry cover takes by heat, as a share of it"),
      water: share("one standard deviation of what the water on a cover takes, as a share of it"),
      rain_rate: quantity("ratio", {
        about: "a factor by which one standard deviation multiplies the rain rate (1 is exact)",
        range: [1, 5],
      }).optional(),
      rain_length: share("one standard deviation of the length of path in the rain, as a share of it"),
      gas: share("one standard deviation of what gases take, as a share of it"),
      fog: share("one standard deviation of what fog takes, as a share of it"),
      diffraction: decibels("one standard deviation of the loss over terrain"),
      troposcatter: decibels("one standard deviation of the loss by troposcatter"),
      rain_scatter: decibels("one standard deviation of the loss by rain scatter"),
      foliage: decibels("one standard deviation of the loss in trees"),
      tilt: uncertain("levelDb", {
        about: "loss by crossed or tilted polarization",
        range: [0, 60],
      }).optional(),
      blunder: blunder().optional(),
      correlation: correlation().optional(),
    },
    "the spread of what no field states: feed_return_loss, cover_loss, water, rain_rate, correlation and more",
  ).transform(
    (typed): SpreadSettings => ({
      feedReturnLossDb: typed.feed_return_loss,
      coverLossShare: shareOf(typed.cover_loss),
      waterShare: shareOf(typed.water),
      rainRateFactor: typed.rain_rate,
      rainLengthShare: shareOf(typed.rain_length),
      gasShare: shareOf(typed.gas),
      fogShare: shareOf(typed.fog),
      diffractionDb: typed.diffraction,
      troposcatterDb: typed.troposcatter,
      rainScatterDb: typed.rain_scatter,
      foliageDb: typed.foliage,
      tiltLossDb: typed.tilt,
      blunder: typed.blunder,
      correlation: typed.correlation,
    }),
  );

/** Few files have it, and its many fields would be felt at every start: it is built for those alone. */
export const spreadSchema = z.lazy(spread);

function shareOf(percent: number | undefined): number | undefined {
  return percent === undefined ? undefined : percent / 100;
}
