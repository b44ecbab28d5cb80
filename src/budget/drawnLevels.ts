import type { Scatter } from "../numeric/scatter.ts";
import type { EndName, Scenario, Uncertain } from "../scenario/types.ts";
import {
  type Cause,
  column,
  logSpread,
  type Matter,
  type Sketch,
  STILL,
  tiedUniforms,
  uniformsOf,
  valuesOf,
} from "./causes.ts";
import type { Doubts } from "./doubts.ts";
import { aimLevels } from "./drawnAim.ts";
import type { Entry } from "./entry.ts";
import type { Link, PreparedEnd } from "./types.ts";

/** Root of 3: a flat spread reaches this many standard deviations. */
const FLAT_REACH = Math.sqrt(3);

export type EndsInUse = Readonly<Record<EndName, PreparedEnd>>;

/** A cause whose value adds to a level as it stands: `sign` times what it differs by from `nominal`. */
interface Level {
  readonly cause: Cause;
  readonly nominal: number;
  readonly sign: 1 | -1;
  /** Value below which it cannot fall. */
  readonly least?: number;
  /** Which of both ends' equals are alike. */
  readonly kind?: "line" | "gain";
}

/**
 * What draws add to the margin by everything that all covers and weathers share: power, lines, gains, aim, place,
 * tilt, trees, blunders, the mode's threshold [dB].
 */
export function commonLevel(
  sketch: Sketch,
  link: Link,
  ends: EndsInUse,
  feeds: Readonly<Record<EndName, string>>,
  mode: string,
): { level: Float64Array; receiverLineDb: Float64Array } {
  const { scenario, doubts } = link;
  const own = (["transmitter", "receiver"] as const).flatMap((end) =>
    endLevels(scenario, ends, end, feeds[end]),
  );
  const shared = [...pathLevels(link), ...tiltLevel(scenario, doubts), ...operatorLevels(link, mode)];
  const ownColumns = own.map((level) => levelColumn(sketch, level, tiedToTwin(sketch, level, own, doubts)));
  const lineIndex = own.findIndex(({ cause }) => cause.id === "rx.line");
  const lineDb = scenario.receiver.lineLossDb.value;
  const receiverLineDb = column(sketch, (out) => {
    if (lineIndex < 0) out.fill(lineDb);
    else for (let i = 0; i < out.length; i++) out[i] = lineDb - ownColumns[lineIndex]![i]!;
  });
  const level = sumOfColumns(sketch, [
    ...ownColumns,
    ...shared.map((level) => levelColumn(sketch, level, uniformsOf(sketch, level.cause))),
    ...aimLevels(sketch, scenario, ends, doubts),
  ]);
  return { level, receiverLineDb };
}

function levelColumn(
  sketch: Sketch,
  { cause, nominal, sign, least = Number.NEGATIVE_INFINITY }: Level,
  uniforms: Float64Array,
): Float64Array {
  const values = valuesOf(sketch, nominal, cause.scatter, uniforms);
  return column(sketch, (out) => {
    for (let i = 0; i < out.length; i++) out[i] = sign * (Math.max(least, values[i]!) - nominal);
  });
}

/** The receiver's random numbers, tied to those of the transmitter's equal where the scenario says so. */
function tiedToTwin(sketch: Sketch, level: Level, all: readonly Level[], doubts: Doubts): Float64Array {
  const uniforms = uniformsOf(sketch, level.cause);
  const { end, id } = level.cause;
  const twin = all.find(({ cause }) => cause.end === "transmitter" && cause.id === id.replace("rx.", "tx."));
  if (end !== "receiver" || twin === undefined || level.kind === undefined) return uniforms;
  return tiedUniforms(sketch, uniformsOf(sketch, twin.cause), uniforms, doubts.correlation[level.kind]);
}

/** Power, line and gain of one end; its aim stands in `drawnAim.ts`. */
function endLevels(scenario: Scenario, ends: EndsInUse, end: EndName, feed: string): Level[] {
  const { power, line, antenna } = ends[end];
  const { lineLossDb, dish: dishName } = scenario[end];
  const dish = dishName === undefined ? undefined : scenario.dish[dishName]!;
  const gainDbi = dish === undefined ? scenario.feeds[feed]?.gainDbi : dish.gainDbi;
  const gains = antenna.filter(({ id }) => !id.endsWith(".pointing"));
  return [
    ...(power === undefined ? [] : [gainLevel(power, "power", end, scenario.transmitter.powerDbm)]),
    { ...lossLevel(line, "line", end, lineLossDb), kind: "line" as const },
    ...gains.map((entry): Level => {
      const level = entry.id.endsWith(".other")
        ? lossLevel(entry, "gain", end, dish?.otherLossesDb)
        : gainLevel(entry, "gain", end, entry.id.endsWith(".gain") ? gainDbi : undefined);
      return { ...level, kind: "gain" };
    }),
  ].filter(({ cause: { scatter } }) => scatter.kind !== "normal" || scatter.sigma > 0);
}

function gainLevel(entry: Entry, matter: Matter, end: EndName, input?: Uncertain): Level {
  return { cause: causeOf(entry, matter, end, input), nominal: entry.db, sign: 1 };
}

function lossLevel(entry: Entry, matter: Matter, end: EndName, input?: Uncertain): Level {
  return { cause: causeOf(entry, matter, end, input), nominal: -entry.db, sign: -1, least: 0 };
}

/** A cause out of an entry: it scatters as its input is stated to, else normally with the entry's deviation. */
function causeOf(
  { id, label, sigma }: Entry,
  matter: Matter,
  end: EndName | undefined,
  input?: Uncertain,
): Cause {
  const scatter = input?.scatter ?? ({ kind: "normal", sigma } as const);
  const unit = matter === "power" ? "dBm" : "dB";
  return { id, matter, end, label, scatter, unit, stated: isStated(input), still: STILL };
}

export function isStated(input: Uncertain | undefined): boolean {
  return input?.scatter !== undefined || input?.sigma !== undefined;
}

/** Where a short locator leaves the stations, and the trees near them. */
function pathLevels({ scenario, weathers, foliage }: Link): Level[] {
  const place = Object.values(weathers)[0]!.entries.find(({ id }) => id === "path.free_space")!;
  const reach = FLAT_REACH * place.sigma;
  const placeCause: Cause = {
    ...causeOf(place, "place", undefined),
    label: "place of the stations",
    scatter: { kind: "flat", low: -reach, high: reach },
    stated: true,
  };
  return [
    ...(reach > 0 ? [{ cause: placeCause, nominal: 0, sign: -1 as const }] : []),
    ...foliage.map((trees): Level => {
      const scatter: Scatter = { kind: "lognormal", factor: Math.exp(logSpread(trees.sigma / -trees.db)) };
      const cause: Cause = {
        ...causeOf(trees, "trees", undefined),
        scatter,
        unit: "share",
        stated: scenario.spread?.foliageDb !== undefined,
      };
      return { cause, nominal: -trees.db, sign: -1 };
    }),
  ];
}

/** A budget takes no tilt, so that what is drawn is all of it. */
function tiltLevel({ spread }: Scenario, { tiltLossDb }: Doubts): Level[] {
  if (tiltLossDb.value === 0 && !isStated(tiltLossDb)) return [];
  const cause: Cause = {
    id: "path.tilt",
    matter: "tilt",
    end: undefined,
    label: "tilted polarization",
    scatter: tiltLossDb.scatter ?? { kind: "normal", sigma: tiltLossDb.sigma ?? 0 },
    unit: "dB",
    stated: spread?.tiltLossDb !== undefined,
    still: STILL,
  };
  return [{ cause, nominal: 0, sign: -1, least: 0 }];
}

/** Whoever reads the signal, and what now and then is plainly wrong: a relay, the sideband, a dead stage. */
function operatorLevels({ scenario, modes, doubts }: Link, mode: string): Level[] {
  const { label, sigmaDb, source } = modes[mode]!;
  const { chance, lossDb } = doubts.blunder;
  const threshold: Cause = {
    id: "mode.required",
    matter: "operator",
    end: undefined,
    label: `threshold of ${label}`,
    scatter: { kind: "normal", sigma: sigmaDb },
    unit: "dB",
    stated: source === "scenario",
    still: 0.5,
  };
  const blunder: Cause = {
    id: "blunder",
    matter: "blunder",
    end: undefined,
    label: "blunder",
    scatter: {
      kind: "mixture",
      parts: [
        { share: 1 - chance, value: 0 },
        {
          share: chance,
          value: lossDb.value,
          scatter: lossDb.scatter ?? { kind: "normal", sigma: lossDb.sigma ?? 0 },
        },
      ],
    },
    unit: "dB",
    stated: scenario.spread?.blunder !== undefined,
    still: STILL,
  };
  return [
    ...(sigmaDb > 0 ? [{ cause: threshold, nominal: 0, sign: -1 as const }] : []),
    ...(chance > 0 ? [{ cause: blunder, nominal: 0, sign: -1 as const }] : []),
  ];
}

/** Sum of columns, row by row; nothing where there are none. */
function sumOfColumns(sketch: Sketch, parts: readonly Float64Array[]): Float64Array {
  return column(sketch, (out) => {
    out.fill(0);
    for (const part of parts) for (let i = 0; i < out.length; i++) out[i]! += part[i]!;
  });
}
