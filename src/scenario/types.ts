import type { MonthlyClimate } from "../atmosphere/rainRate.ts";
import type { RainZone } from "../atmosphere/rainZones.ts";
import type { Bounded } from "../cover/bounded.ts";
import type { Wetting } from "../cover/materials.ts";
import type { SurfaceCare } from "../cover/surfaceState.ts";
import type { WetModel } from "../cover/wetModels.ts";
import type { Scatter } from "../numeric/scatter.ts";
import type { Profile } from "../path/profile.ts";
import type { Mode } from "../receiver/modes.ts";
import type { TerrainGap } from "./terrain/types.ts";

export type { Scatter };

/**
 * A scenario after reading: every quantity in one canonical unit, named in the field.
 *
 * `loadScenario` makes it from YAML; a program may as well build one by hand.
 */

/**
 * A value that may carry the 1-sigma uncertainty that its user typed, in the unit of the value (dB for powers).
 *
 * The budget takes `value` and `sigma` and no more: of a flat, exponential or mixed input mean and standard
 * deviation, of a log-normal one the median and the standard deviation.
 */
export interface Uncertain {
  readonly value: number;
  readonly sigma?: number | undefined;
  /** How it scatters, where the user named a distribution; otherwise `sigma` is that of a normal one. */
  readonly scatter?: Scatter | undefined;
}

export type Polarization = "horizontal" | "vertical" | "circular";
export type EndName = "transmitter" | "receiver";

export interface Site {
  readonly name?: string | undefined;
  readonly latitude: number;
  readonly longitude: number;
  /** As typed, where the position came from a locator. */
  readonly locator?: string | undefined;
  /** Largest distance of the true position from the one used, half the diagonal of the locator's cell [km]. */
  readonly positionErrorKm: number;
  /** Ground above mean sea level [m]. */
  readonly groundM: number;
  /** Antenna above ground [m]. */
  readonly heightM: number;
}

/** One end's way into the air; an end without a dish radiates from its feed. */
export interface End {
  readonly feed: string;
  /** The cover on the feed's mouth. */
  readonly cover: string;
  /** A cover over the whole dish, beside that on the feed. */
  readonly dishCover?: string | undefined;
  readonly dish?: string | undefined;
  readonly lineLossDb: Uncertain;
}

export interface Transmitter extends End {
  readonly powerDbm: Uncertain;
}

export interface Receiver extends End {
  readonly noiseFigureDb: Uncertain;
  /** Noise temperature of what the antenna sees in dry weather [K]; undefined takes the level-beam default. */
  readonly antennaTemperatureK?: Uncertain | undefined;
  readonly modes: readonly string[];
}

export interface Feed {
  readonly returnLossDb: number;
  /** The same with its spread, where the user typed one. */
  readonly returnLossSpread?: Uncertain | undefined;
  /** Phase of the feed's own reflection seen from outside, at the plane of its mouth [deg]; seldom known. */
  readonly phaseDeg?: number | undefined;
  /** How far the feed's pattern is down at the rim of its dish [dB]. */
  readonly edgeTaperDb?: number | undefined;
  /** Full width of the feed's pattern at -10 dB [deg]. */
  readonly tenDbWidthDeg?: number | undefined;
  /** Gain of the feed used as an antenna by itself [dBi]. */
  readonly gainDbi?: Uncertain | undefined;
  readonly pyramidalHorn?: PyramidalHornSize | undefined;
  readonly conicalHorn?: { readonly diameterM: number; readonly slantM: number } | undefined;
  /** Width of the mouth [mm]. */
  readonly apertureMm?: number | undefined;
  /** Elevation to which the mouth looks [deg]: 0 for a prime-focus feed of a level dish, up for an offset feed. */
  readonly facingDeg: number;
}

export interface PyramidalHornSize {
  readonly guideAM: number;
  readonly guideBM: number;
  readonly apertureAM: number;
  readonly apertureBM: number;
  readonly slantEM: number;
  readonly slantHM: number;
}

export interface Dish {
  readonly diameterM?: number | undefined;
  readonly focalRatio?: number | undefined;
  /** Aperture efficiency 0 to 1, where the user states it instead of focal ratio and edge taper. */
  readonly efficiency?: number | undefined;
  readonly gainDbi?: Uncertain | undefined;
  readonly surfaceRmsMm: number;
  /** What a real dish loses beside: phase of the feed, struts, ohmic loss [dB]. */
  readonly otherLossesDb: Uncertain;
  readonly blockageM: number;
  /** Known standing offset of the aim [deg]. */
  readonly pointingOffsetDeg: number;
  /** Standard deviation of the aim in each axis [deg]. */
  readonly pointingErrorDeg: number;
}

export interface CoverLayer {
  /** Name in the list of materials, or "air", or what the user calls a material of their own. */
  readonly material: string;
  readonly thicknessMm: number;
  readonly thicknessSigmaMm?: number | undefined;
  /** With the spread in which the material is published, or with that of the user: see `statedSpread`. */
  readonly permittivity: Bounded;
  readonly lossTangent: Bounded;
  /** True where the user typed a spread of permittivity, loss tangent or thickness: bounds are then 1 sigma. */
  readonly statedSpread?: boolean | undefined;
  /** True where the spread of the loss tangent is the user's: it stands in the place of the usual doubt of the heat. */
  readonly statedLossTangent?: boolean | undefined;
}

export interface MeasuredCover {
  readonly insertionLossDb: Uncertain;
  readonly returnLossChangeDb?: Uncertain | undefined;
  /** Where the figures come from; the scenario where not given. */
  readonly source?: string | undefined;
}

export interface Cover {
  /** Feed side first; empty for a bare mouth. */
  readonly layers: readonly CoverLayer[];
  readonly measured?: MeasuredCover | undefined;
  readonly surface: Wetting;
  readonly state: SurfaceCare;
  /** Model of the water on it, where the user chose one; otherwise the surface decides. */
  readonly wetModel?: WetModel | undefined;
  /** Distance from the feed's mouth to the cover [mm]. */
  readonly gapMm: number;
  /** Length down which water runs [mm]; the feed's mouth where not given. */
  readonly slopeMm?: number | undefined;
  /** Radius of a spherical cap bulging outwards [mm]; undefined for a flat sheet. */
  readonly domeRadiusMm?: number | undefined;
}

export interface Weather {
  readonly rainMmPerH: Uncertain;
  /** What that rain takes on the path [dB], where the statistics of a year tell it and not the rate. */
  readonly rainFadeDb?: number | undefined;
  /** Length of path in the rain [km]; undefined takes the effective length of P.530. */
  readonly extentKm?: number | undefined;
  /** Liquid water of fog on the path [g/m3]. */
  readonly fogGPerM3: number;
  readonly fogExtentKm?: number | undefined;
  readonly temperatureC?: number | undefined;
  readonly pressureHPa?: number | undefined;
  readonly humidityPercent?: number | undefined;
  readonly dewPointC?: number | undefined;
  readonly vapourDensityGPerM3?: number | undefined;
  /** Wind towards the mouths of the feeds [m/s]. */
  readonly windMPerS: number;
  readonly wets: readonly EndName[];
  /** Rain rate at which the covers got their water, where it is not the rain now on the path [mm/h]. */
  readonly coversWetAsAtMmPerH?: number | undefined;
  /** Time since the rain that wetted the covers stopped [min]. */
  readonly driedForMin: number;
  /** Film of dew on the covers [mm]. */
  readonly dewMm: Uncertain;
  /** Clear ice on the covers [mm]. */
  readonly iceMm: number;
  readonly snow?: Snow | undefined;
}

/** Snow that lies on the covers. */
export interface Snow {
  readonly depthMm: number;
  readonly dryDensityGcm3: number;
  /** Liquid water by volume [%]. */
  readonly wetnessPercent: number;
}

export interface Decision {
  readonly reserveDb: number;
  /** 0 to 1. */
  readonly confidence: number;
}

/**
 * One standard deviation of what no field of the scenario states, for a study of the spread; undefined leaves it to
 * the study. Shares are those of the decibels that an entry takes, 0.4 being 40 %.
 */
export interface SpreadSettings {
  readonly feedReturnLossDb?: number | undefined;
  readonly coverLossShare?: number | undefined;
  readonly waterShare?: number | undefined;
  /** One standard deviation multiplies or divides the rain rate by it; 1 is exact. */
  readonly rainRateFactor?: number | undefined;
  readonly rainLengthShare?: number | undefined;
  readonly gasShare?: number | undefined;
  readonly fogShare?: number | undefined;
  readonly diffractionDb?: number | undefined;
  readonly troposcatterDb?: number | undefined;
  readonly rainScatterDb?: number | undefined;
  readonly foliageDb?: number | undefined;
  /** Loss by crossed or tilted polarization [dB]. */
  readonly tiltLossDb?: Uncertain | undefined;
  /** A slip of the operator or a dead switch: how likely it is, 0 to 1, and what it costs [dB]. */
  readonly blunder?: { readonly chance: number; readonly lossDb: Uncertain } | undefined;
  readonly correlation?: EndCorrelation | undefined;
}

/** How far what scatters at one end scatters alike at the other, -1 to 1. */
export interface EndCorrelation {
  readonly water?: number | undefined;
  /** Loss and thickness of sheets cut from one batch. */
  readonly cover?: number | undefined;
  readonly aim?: number | undefined;
  readonly gain?: number | undefined;
  readonly returnLoss?: number | undefined;
  readonly line?: number | undefined;
}

/** The two ends and what lies between; `budget/pathSettings.ts` stands in for what is not given. */
export interface ScenarioPath {
  readonly from: Site;
  readonly to: Site;
  /** File or folder of the ground's heights, as typed. */
  readonly terrain?: string | undefined;
  /** Ground from `from` to `to`, read from `terrain`. */
  readonly profile?: Profile | undefined;
  /** Stretches of the path where the terrain knows no height. */
  readonly gaps?: readonly TerrainGap[] | undefined;
  /** Effective Earth radius over the true one, on the usual day. */
  readonly k?: number | undefined;
  /** The same on a day when rays bend least. */
  readonly kLow?: number | undefined;
  /** Median refractivity at sea level [N-units]. */
  readonly N0?: number | undefined;
  /** Median fall of refractivity over the lowest kilometre [N-units/km]. */
  readonly dN?: number | undefined;
  /** Length of the ray within trees near each end [m]. */
  readonly foliageM?: { readonly from: number; readonly to: number } | undefined;
  /** Distance over land to the coast along the path, from each end [km]. */
  readonly coastKm?: { readonly from?: number | undefined; readonly to?: number | undefined } | undefined;
}

/** How the rain of an average year was given. */
export type RainOfTheYear =
  | { readonly kind: "rate"; readonly rainRate001MmPerH: number }
  | { readonly kind: "zone"; readonly zone: RainZone }
  | ({ readonly kind: "monthly" } & MonthlyClimate)
  /** The rate is that of the map half-way; `loadScenario` reads it. */
  | { readonly kind: "map"; readonly folder: string; readonly rainRate001MmPerH: number | undefined };

/** Rain and air of an average year. */
export interface Climate {
  readonly rain: RainOfTheYear;
  /** Refractivity gradient of the lowest 65 m not exceeded for 1 % of the year [N-units/km]. */
  readonly dN1?: number | undefined;
  readonly terrainRoughnessM?: number | undefined;
  /** Above mean sea level [m]; undefined leaves wet snow out. */
  readonly meanRainHeightM?: number | undefined;
}

export interface Scenario {
  readonly title: string;
  readonly frequencyGHz: number;
  readonly polarization: Polarization;
  readonly transmitter: Transmitter;
  readonly receiver: Receiver;
  readonly feeds: Readonly<Record<string, Feed>>;
  readonly covers: Readonly<Record<string, Cover>>;
  readonly dish: Readonly<Record<string, Dish>>;
  readonly modes: Readonly<Record<string, Mode>>;
  readonly path: ScenarioPath;
  readonly weather: Readonly<Record<string, Weather>>;
  readonly climate?: Climate | undefined;
  readonly decision: Decision;
  readonly spread?: SpreadSettings | undefined;
}

/** A scenario read, and the file that it came from. */
export interface ReadScenario {
  readonly scenario: Scenario;
  /** The YAML document, every plain value as the text that was typed. */
  readonly typed: unknown;
}

/** A fault or a doubt in a scenario file. Lines and columns count from 1. */
export interface Diagnostic {
  readonly code: string;
  readonly message: string;
  readonly line: number;
  readonly column: number;
}
