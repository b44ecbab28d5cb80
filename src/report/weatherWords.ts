import type { Link } from "../budget/types.ts";
import type { RainStretch } from "../study/breakEven.ts";
import { isBare } from "../study/coverPairs.ts";
import type { CoverLadder, ModeLadder, WeatherLadder } from "../study/weatherLadder.ts";
import { pairName } from "./marginText.ts";
import { askedFigure, backWords, rainWordsText, rateFigure, wayWords } from "./rateWords.ts";
import { capital, listed, tenth } from "./words.ts";

/** The answer for a mode: how hard it may rain, and what the cover takes of that. */
export function modeAnswer({ mode, covers }: ModeLadder, link: Link): string {
  const own = covers[0]!;
  const bare = covers.find(isBare)!;
  const under = isBare(own) ? "with bare feeds" : `under ${pairName(own)}`;
  return [
    `${capital(link.modes[mode]!.label)} ${fate(own, under)}.`,
    ...(own === bare ? [] : [`Bare, it ${fate(bare)}${coverCost(own, bare)}.`]),
  ].join(" ");
}

/** Up to which rain the path closes, and from which on nothing is left; rain in words where `under` names the cover. */
function fate({ rungs, breakEven: { both } }: CoverLadder, under?: string): string {
  const { closesMmPerH, closesBack, zeroMmPerH, zeroBack } = both;
  const where = under === undefined ? "" : ` ${under}`;
  const { marginDb } = rungs.both[0]!;
  const worded = (rateMmPerH: number) =>
    `${rateFigure(rateMmPerH)} mm/h${under === undefined ? "" : ` (${rainWordsText(rateMmPerH)})`}`;
  const again = (before: number) => (before === 0 ? "" : " again");
  const whenBack = (verb: string, before: number, stretches: readonly RainStretch[]) =>
    stretches.length === 0 ? [] : [`${verb}${again(before)} ${backWords(stretches)}`];
  if (closesMmPerH === undefined) return `closes in any rain${where}`;
  const closing =
    zeroMmPerH === 0
      ? `fails without rain already${where}, by ${tenth(-marginDb)} dB`
      : closesMmPerH === 0
        ? `is thin without rain already${where} (${tenth(marginDb)} dB)`
        : `closes up to ${worded(closesMmPerH)}${where}`;
  const gone =
    zeroMmPerH === undefined
      ? ["never loses all"]
      : zeroMmPerH === 0
        ? []
        : [
            `has nothing left from ${closesMmPerH === 0 ? worded(zeroMmPerH) : `${rateFigure(zeroMmPerH)} mm/h`} on`,
          ];
  return listed([
    closing,
    ...whenBack("closes", closesMmPerH, closesBack),
    ...gone,
    ...(zeroMmPerH === undefined ? [] : whenBack("has something left", zeroMmPerH, zeroBack)),
  ]);
}

/** How much less rain the path stands under its cover, by the figures told of both; untold where margins come back. */
function coverCost(own: CoverLadder, bare: CoverLadder): string {
  const [under, open] = [own.breakEven.both, bare.breakEven.both];
  if (
    under.zeroMmPerH === undefined ||
    !open.zeroMmPerH ||
    under.zeroBack.length + open.zeroBack.length > 0
  ) {
    return "";
  }
  const cost = Number(rateFigure(open.zeroMmPerH)) - Number(rateFigure(under.zeroMmPerH));
  if (cost === 0) return ": the cover costs no rain that could be told";
  const figure = Math.abs(cost).toFixed(under.zeroMmPerH < 10 ? 1 : 0);
  return `: till nothing is left the cover ${cost > 0 ? "costs" : "wins"} ${figure} mm/h of rain`;
}

/** What rain on the path, water on the covers and both together take in one rain. */
export function partsSentence({ weather, rates, modes }: WeatherLadder, { scenario }: Link): string {
  const own = modes[0]!.covers[0]!;
  const at = tellingRung(
    own,
    rates.map(({ rateMmPerH }) => rateMmPerH),
    scenario.weather[weather]!.rainMmPerH.value,
  );
  const taken = (on: keyof CoverLadder["rungs"]) => own.rungs[on][0]!.marginDb - own.rungs[on][at]!.marginDb;
  const [path, covers, both] = [taken("path"), taken("covers"), taken("both")];
  const rain = `At ${askedFigure(rates[at]!.rateMmPerH)} mm/h rain on the path ${change(path)}`;
  // A model of wet covers that starts from rain on the path charges nothing for water by itself.
  if (tenth(covers) === "0.0" && tenth(both) === tenth(path)) {
    return `${rain}, water on the covers none that could be told.`;
  }
  // Rain that scatters a signal over a hill brings more than it takes.
  if (path <= -0.05 || both <= -0.05) {
    return `${rain}, water on the covers ${change(covers)}, and both together ${change(both, "s")}.`;
  }
  return `${rain}, water on the covers ${tenth(covers)} dB and both together ${tenth(both)} dB.`;
}

/** What rain does to a margin that goes down by so much [dB]. */
function change(lossDb: number, plural = ""): string {
  const verb = lossDb <= -0.05 ? "bring" : "take";
  return `${verb}${plural === "" ? "s" : ""} ${tenth(Math.abs(lossDb))} dB`;
}

/** The rung of the weather's own rain, or the hardest rain that leaves something; never that without rain. */
function tellingRung({ rungs }: CoverLadder, rates: readonly number[], ownMmPerH: number): number {
  const own = ownMmPerH > 0 ? rates.indexOf(ownMmPerH) : -1;
  return own > 0
    ? own
    : Math.max(
        1,
        rungs.both.findLastIndex(({ marginDb }) => marginDb > 0),
      );
}

/** Which way carries the path in which rain. */
export function waySentence({ covers }: ModeLadder, { ground }: Link): string {
  if (ground === undefined) return "Line of sight is taken: no hill, tree or building in the way.";
  const spans: { way: string; first: number; last: number }[] = [];
  for (const { rateMmPerH, mechanism } of covers[0]!.rungs.both) {
    const way = wayWords[mechanism];
    const open = spans.at(-1);
    if (open?.way === way) open.last = rateMmPerH;
    else spans.push({ way, first: rateMmPerH, last: rateMmPerH });
  }
  if (spans.length === 1) return `${capital(spans[0]!.way)} carries the path in every rain of this table.`;
  const said = spans.map(({ way, first, last }, i) => {
    const rain =
      i === 0
        ? `up to ${askedFigure(last)} mm/h`
        : i === spans.length - 1
          ? `from ${askedFigure(first)} mm/h on`
          : `from ${askedFigure(first)} to ${askedFigure(last)} mm/h`;
    return i === 0 ? `${way} carries the path ${rain}` : `${way} ${rain}`;
  });
  return `${capital(listed(said))}.`;
}

/** What of the weather stays while its rain varies. */
export function keptSentence({ weather }: WeatherLadder, { scenario }: Link): string {
  const { extentKm, wets, windMPerS, temperatureC, fogGPerM3, dewMm, iceMm, snow } =
    scenario.weather[weather]!;
  const kept = [
    extentKm === undefined
      ? "rain over the effective length of P.530"
      : `rain over ${extentKm} km of the path`,
    wets.length === 2
      ? "the covers of both ends wet"
      : wets.length === 1
        ? `only the ${wets[0]}'s cover wet`
        : "no cover wet",
    `wind ${windMPerS} m/s`,
    ...(temperatureC === undefined ? [] : [`${temperatureC} degC`]),
    ...(fogGPerM3 > 0 ? [`fog ${fogGPerM3} g/m3`] : []),
    ...(dewMm.value > 0 ? [`dew ${dewMm.value} mm on the covers`] : []),
    ...(iceMm > 0 ? [`ice ${iceMm} mm on the covers`] : []),
    ...(snow === undefined ? [] : [`snow ${snow.depthMm} mm on the covers`]),
  ];
  return `All but the rate stays as in ${weather}: ${kept.join(", ")}.`;
}
