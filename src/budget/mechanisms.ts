import { outside } from "../numeric/check.ts";
import { dbToPower } from "../numeric/decibels.ts";
import { foliageLoss, foliageValidity } from "../path/foliage.ts";
import { freeSpaceLoss } from "../path/freeSpaceLoss.ts";
import { pointAlong } from "../path/geodesic.ts";
import { pathLengthKm } from "../path/profile.ts";
import { rainHeight } from "../path/rainHeight.ts";
import { rainScatterLoss } from "../path/rainScatter.ts";
import { rainCellWidth, scatterHeight, visibleHeight } from "../path/scatterCell.ts";
import { smoothEarthValidity } from "../path/smoothEarth.ts";
import {
  interferenceTroposcatterLoss,
  troposcatterLoss,
  troposcatterValidity,
} from "../path/troposcatter.ts";
import type { Scenario } from "../scenario/types.ts";
import { type Doubts, doubtsOf } from "./doubts.ts";
import { type Entry, lossEntry, sumOf } from "./entry.ts";
import { diffractionSigma, type GroundPath } from "./groundPath.ts";
import { overreachWarning } from "./overreach.ts";
import type { Link, Mechanism, PreparedEnd, PreparedWeather, Warning } from "./types.ts";

/** Less than this is no diffraction [dB]. */
const NOTHING_DB = 0.005;
/** Rain cells of the model begin here [mm/h]. */
const LEAST_CELL_MM_PER_H = 0.4;
/** A cell is taken no flatter than this [km]. */
const LEAST_CELL_HEIGHT_KM = 1;
/** Gain times the square of a beam's width [deg^2]: from memory. */
const GAIN_BEAMWIDTH2 = 30_000;

/** Falling drops shift and smear what they scatter: common practice, no source. */
const SCATTER_SPREADS: Warning = {
  code: "scatter_spreads",
  message:
    "rain scatter smears a signal over some 50 Hz and more: a mode narrower than that loses what its narrow filter " +
    "gains, which is not charged, and voice comes rough",
  where: "path",
};

const lineOfSight: Omit<Mechanism, "lossDb"> = {
  name: "line_of_sight",
  label: "line of sight",
  excessDb: 0,
  sigmaDb: 0,
  source: "P.525-4",
  warnings: [],
};

/**
 * The ways that a signal may take in one weather, the one of least loss first; each is an alternative to the
 * others. Gas, rain and fog come on top of all of them alike: rain on both legs of rain scatter is that of the path.
 *
 * @param transmitter  end with the feed of the case: narrow beams lose gain to scatter
 */
export function mechanismsOf(
  { scenario, path, ground, doubts }: Pick<Link, "scenario" | "path" | "ground" | "doubts">,
  weather: PreparedWeather,
  transmitter: PreparedEnd,
  receiver: PreparedEnd,
): Mechanism[] {
  const { frequencyGHz } = scenario;
  const freeSpaceDb = freeSpaceLoss({ frequencyGHz, distanceKm: path.distanceKm }).lossDb;
  const overAll = (mechanism: Omit<Mechanism, "lossDb">) => ({
    ...mechanism,
    lossDb: freeSpaceDb + mechanism.excessDb,
  });
  if (ground === undefined) return [overAll(lineOfSight)];
  return [
    alongGround(ground, doubts),
    ...troposcatter(ground, doubts, freeSpaceDb, transmitter, receiver),
    ...rainScatter(scenario, ground, doubts, freeSpaceDb, weather, transmitter, receiver),
  ]
    .map(overAll)
    .sort((a, b) => a.excessDb - b.excessDb);
}

/** What the way costs beyond free space, as entries: none on a line of sight. */
export function mechanismEntries({ name, label, excessDb, sigmaDb, source }: Mechanism): Entry[] {
  if (name === "line_of_sight") return [];
  return [lossEntry({ id: `path.${name}`, stage: "path", label, source }, excessDb, sigmaDb)];
}

/** Trees near either end, whatever way the signal takes. */
export function foliageEntries(scenario: Scenario): Entry[] {
  const {
    frequencyGHz,
    path: { foliageM },
  } = scenario;
  if (foliageM === undefined || foliageM.from + foliageM.to === 0) return [];
  const near = foliageLoss({ frequencyGHz, depthM: foliageM.from });
  const far = foliageLoss({ frequencyGHz, depthM: foliageM.to });
  const bounded = {
    nominal: near.lossDb + far.lossDb,
    low: near.lowDb + far.lowDb,
    high: near.highDb + far.highDb,
  };
  const label = `trees, ${Math.round(foliageM.from + foliageM.to)} m of them`;
  const source = "CCIR Rep. 236-2, Weissberger 1982";
  const heading = { id: "path.foliage", stage: "path", label, source } as const;
  return [lossEntry(heading, bounded, doubtsOf(scenario).foliageDb ?? Math.hypot(near.sigmaDb, far.sigmaDb))];
}

export function foliageWarnings({ frequencyGHz, path: { foliageM } }: Scenario): Warning[] {
  if (foliageM === undefined) return [];
  return outside(foliageValidity, { frequencyGHz }).map(overreachWarning("trees", "path.foliage"));
}

/** Line of sight where the first Fresnel zone is clear enough, diffraction elsewhere. */
function alongGround(ground: GroundPath, { diffractionDb }: Doubts): Omit<Mechanism, "lossDb"> {
  const { lossDb } = ground.diffraction;
  if (lossDb < NOTHING_DB) return lineOfSight;
  const { frequencyGHz } = ground.sight;
  return {
    name: "diffraction",
    label: ground.fromTerrain ? "diffraction over terrain" : "diffraction over a smooth Earth",
    excessDb: lossDb,
    sigmaDb: diffractionSigma(ground, diffractionDb),
    source: "P.526-15 4.5.3",
    warnings: outside(smoothEarthValidity, { frequencyGHz }).map(
      overreachWarning("diffraction by P.526", "path"),
    ),
  };
}

/**
 * By the Recommendation for a wanted signal, or by the term of P.452 where that is less hopeful: as the angle between
 * the horizons vanishes the former falls below free space.
 */
function troposcatter(
  { analysis, sight, settings, profile }: GroundPath,
  doubts: Doubts,
  freeSpaceDb: number,
  transmitter: PreparedEnd,
  receiver: PreparedEnd,
): Omit<Mechanism, "lossDb">[] {
  if (analysis.pathType === "los" || analysis.angularDistanceMrad <= 0) return [];
  const { frequencyGHz } = sight;
  const distanceKm = pathLengthKm(profile);
  // Field by field: spreading three large objects takes longer than the model.
  const { N0, dN } = settings;
  const { angularDistanceMrad } = analysis;
  const txGainDbi = sumOf(transmitter.antenna, "db");
  const rxGainDbi = sumOf(receiver.antenna, "db");
  const percent = 50;
  const wantedDb = troposcatterLoss({
    frequencyGHz,
    distanceKm,
    txHeightAmslM: sight.txHeightAmslM,
    rxHeightAmslM: sight.rxHeightAmslM,
    effectiveRadiusKm: sight.effectiveRadiusKm,
    txHorizonMrad: analysis.txHorizonMrad,
    rxHorizonMrad: analysis.rxHorizonMrad,
    txGainDbi,
    rxGainDbi,
    N0,
    dN,
    groundHeightKm: middleGroundM(profile) / 1000,
    percent,
  }).lossDb;
  const cautiousDb = interferenceTroposcatterLoss({
    frequencyGHz,
    distanceKm,
    angularDistanceMrad,
    N0,
    txGainDbi,
    rxGainDbi,
    gasDb: 0,
    percent,
  });
  const wanted = wantedDb >= cautiousDb;
  const overreaches = wanted ? outside(troposcatterValidity, { frequencyGHz, distanceKm }) : [];
  return [
    {
      name: "troposcatter",
      label: "troposcatter",
      excessDb: Math.max(wantedDb, cautiousDb) - freeSpaceDb,
      sigmaDb: doubts.troposcatterDb,
      source: wanted ? "P.617-5, median" : "P.452-18 4.3, median",
      warnings: overreaches.map(overreachWarning("troposcatter by P.617", "path")),
    },
  ];
}

/** A cell with the weather's rain over the middle of the path, both beams raised to it; none where only ice is seen. */
function rainScatter(
  { path: { from, to } }: Scenario,
  { analysis, sight, profile, polarization }: GroundPath,
  doubts: Doubts,
  freeSpaceDb: number,
  { weather: { rainMmPerH, extentKm = Infinity } }: PreparedWeather,
  transmitter: PreparedEnd,
  receiver: PreparedEnd,
): Omit<Mechanism, "lossDb">[] {
  const rainRateMmPerH = rainMmPerH.value;
  if (rainRateMmPerH <= LEAST_CELL_MM_PER_H) return [];
  const { frequencyGHz, effectiveRadiusKm } = sight;
  const halfKm = pathLengthKm(profile) / 2;
  const seenFrom = (stationAmslM: number, horizonMrad: number) =>
    visibleHeight({ stationAmslM, horizonMrad, distanceKm: halfKm, effectiveRadiusKm }).heightAmslM;
  const visible = {
    visible1AmslM: seenFrom(sight.txHeightAmslM, analysis.txHorizonMrad),
    visible2AmslM: seenFrom(sight.rxHeightAmslM, analysis.rxHorizonMrad),
  };
  const { heightKm } = rainHeight({ latitudeDeg: pointAlong({ from, to, share: 0.5 }).latitude });
  const { overRainM, iceOnly } = scatterHeight({ ...visible, rainHeightAmslM: 1000 * heightKm });
  if (iceOnly) return [];
  const openKm = heightKm - Math.max(visible.visible1AmslM, visible.visible2AmslM) / 1000;
  const { lossDb } = rainScatterLoss({
    frequencyGHz,
    rainRateMmPerH,
    polarization,
    r1Km: halfKm,
    r2Km: halfKm,
    scatterDeg: 0,
    g1Dbi: 0,
    g2Dbi: 0,
    beamwidth1Deg: beamwidthDeg(transmitter),
    beamwidth2Deg: beamwidthDeg(receiver),
    cellWidthKm: Math.min(extentKm, rainCellWidth({ rainRateMmPerH }).widthKm),
    cellHeightKm: Math.max(LEAST_CELL_HEIGHT_KM, openKm),
    heightOverRainKm: overRainM / 1000,
  });
  return [
    {
      name: "rain_scatter",
      label: "rain scatter at mid-path",
      excessDb: lossDb - freeSpaceDb,
      sigmaDb: doubts.rainScatterDb,
      source: "bistatic radar equation, Z = 200 R^1.6",
      warnings: [SCATTER_SPREADS],
    },
  ];
}

/** Of an antenna whose width is not known, by its gain. */
function beamwidthDeg({ beamwidthDeg, antenna }: PreparedEnd): number {
  return beamwidthDeg ?? Math.sqrt(GAIN_BEAMWIDTH2 / dbToPower(sumOf(antenna, "db")));
}

/** Ground half-way above mean sea level [m]: of the point next to it. */
function middleGroundM({ distancesKm, heightsM }: GroundPath["profile"]): number {
  const half = distancesKm[distancesKm.length - 1]! / 2;
  let i = 0;
  while (distancesKm[i]! < half) i++;
  return heightsM[i]!;
}
