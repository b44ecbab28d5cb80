import type { EndName } from "../scenario/types.ts";
import { type Cause, newSketch } from "./causes.ts";
import { type DrawnCover, drawnCover } from "./drawnCover.ts";
import { drawnDish } from "./drawnDish.ts";
import { type DrawnFeed, drawnFeed } from "./drawnFeed.ts";
import { commonLevel } from "./drawnLevels.ts";
import { marginColumn } from "./drawnMargin.ts";
import { type DrawnMouth, drawnMouth } from "./drawnMouth.ts";
import { drawnReceiver } from "./drawnReceiver.ts";
import { type DrawnWeather, drawnWeather } from "./drawnWeather.ts";
import { evaluate } from "./evaluate.ts";
import { onlyWith } from "./onlyWith.ts";
import type { Budget, Case, Link, Mouth } from "./types.ts";

/** Cases made ready to be drawn: fill `uniforms`, call `work`, read `margins`. All of it lies in memory of its own. */
export interface Drawing {
  readonly causes: readonly Cause[];
  readonly budgets: readonly Budget[];
  /** Draws of a block. */
  readonly block: number;
  /** Random numbers strictly inside (0, 1), or `STILL`: by cause, then by draw. */
  readonly uniforms: readonly Float64Array[];
  /** Margins [dB]: by case, then by draw; good until the next `work`. */
  readonly margins: readonly Float64Array[];
  readonly work: () => void;
}

/**
 * Makes cases of one mode and one pair of feeds ready to be drawn.
 *
 * The drawn margin is that of `evaluate` with every input moved to its drawn value: levels add up, rain and water
 * follow the models through a grid of rates, the phase between feed and cover and the noise are worked out anew in
 * each draw. With all causes at their `still` probability it is the budget's margin, but for a trace by the phase.
 *
 * @param cases  at least one; all of them with the feeds and the mode of the first
 * @throws RangeError as `evaluate` does, and on cases that mix feeds or modes
 */
export function drawingOf(link: Link, cases: readonly Case[], block = 1024): Drawing {
  const { transmitter, receiver, mode } = cases[0]!;
  const feeds = { transmitter: transmitter.feed, receiver: receiver.feed };
  const alike = (one: Case) =>
    one.mode === mode && one.transmitter.feed === feeds.transmitter && one.receiver.feed === feeds.receiver;
  if (!cases.every(alike)) throw new RangeError("cases drawn together have one mode and one pair of feeds");
  const budgets = cases.map((one) => evaluate(link, one));
  const used = onlyWith(link, cases);
  const ends = {
    transmitter: used.ends.transmitter[feeds.transmitter]!,
    receiver: used.ends.receiver[feeds.receiver]!,
  };

  const sketch = newSketch(block);
  const levels = commonLevel(sketch, used, ends, feeds, mode);
  const receiverNoise = drawnReceiver(sketch, used, levels.receiverLineDb);
  const all = (end: EndName) => cases.map((one) => mouthOf(used, feeds, end, one));
  const beats = (end: EndName) => all(end).some(({ parts }) => parts.beat > 0);
  const [sentFeed, heardFeed] = [
    drawnFeed(sketch, used, feeds, "transmitter", beats("transmitter")),
    drawnFeed(sketch, used, feeds, "receiver", beats("receiver")),
  ];
  const over = (end: EndName) => Object.values(ends[end].dishCover);
  const sentCover = drawnCover(
    sketch,
    used,
    "transmitter",
    all("transmitter"),
    over("transmitter"),
    undefined,
    false,
  );
  const heardCover = (oneBatch: boolean) =>
    drawnCover(sketch, used, "receiver", all("receiver"), over("receiver"), sentCover, oneBatch);
  const [heardOther, heardTwin] = [heardCover(false), heardCover(true)];
  const overBoth = link.scenario.transmitter.dishCover === link.scenario.receiver.dishCover;
  const weathers = new Map<string, DrawnWeather>();
  for (const { weather } of cases) {
    if (!weathers.has(weather)) weathers.set(weather, drawnWeather(sketch, used, ends, weather));
  }
  const margins = cases.map((one, k) => {
    const weather = weathers.get(one.weather)!;
    const oneBatch = one.transmitter.cover === one.receiver.cover;
    const mouth = (end: EndName, feed: DrawnFeed, cover: DrawnCover): DrawnMouth => {
      const nodes = weather.rain?.grid.links ?? [used];
      const mouths = nodes.map((link) => mouthOf(link, feeds, end, one));
      return drawnMouth(sketch, feed, cover, mouths, weather.rain);
    };
    return marginColumn(sketch, budgets[k]!, {
      common: levels.level,
      weather,
      receiver: receiverNoise,
      sent: mouth("transmitter", sentFeed, sentCover),
      heard: mouth("receiver", heardFeed, oneBatch ? heardTwin : heardOther),
      overSender: drawnDish(sketch, used, feeds, "transmitter", weather, sentCover),
      overReceiver: drawnDish(sketch, used, feeds, "receiver", weather, overBoth ? heardTwin : heardOther),
    });
  });
  const { causes, uniforms, steps } = sketch;
  return {
    causes,
    budgets,
    block,
    uniforms,
    margins,
    work: () => {
      for (const step of steps) step();
    },
  };
}

function mouthOf(link: Link, feeds: Readonly<Record<EndName, string>>, end: EndName, one: Case): Mouth {
  return link.ends[end][feeds[end]]!.mouth[one[end].cover]![one.weather]!;
}
