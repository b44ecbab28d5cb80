import type { Bounded } from "../cover/bounded.ts";
import type { CoveredFeed } from "../cover/coveredFeed.ts";
import type { Mode } from "../receiver/modes.ts";
import type { EndName, Scenario, Site, Snow, Uncertain, Weather } from "../scenario/types.ts";
import type { Doubts } from "./doubts.ts";
import type { Entry } from "./entry.ts";
import type { GroundPath } from "./groundPath.ts";

/** A doubt that the user should know of; `where` names the part of the scenario. */
export interface Warning {
  readonly code: string;
  readonly message: string;
  readonly where: string;
}

/** What may vary from budget to budget. */
export interface Case {
  readonly weather: string;
  readonly transmitter: EndChoice;
  readonly receiver: EndChoice;
  readonly mode: string;
}

export interface EndChoice {
  readonly feed: string;
  readonly cover: string;
}

export type MechanismName = "line_of_sight" | "diffraction" | "troposcatter" | "rain_scatter";

/** One way that the signal may take between the antennas. */
export interface Mechanism {
  readonly name: MechanismName;
  readonly label: string;
  /** Free space and excess [dB], without gas and rain. */
  readonly lossDb: number;
  /** What it costs beyond free space [dB]. */
  readonly excessDb: number;
  readonly sigmaDb: number;
  readonly source: string;
  /** Doubts that count where this way carries the path. */
  readonly warnings: readonly Warning[];
}

export type Verdict = "closes" | "thin" | "fails";

export interface Budget {
  readonly case: Case;
  /** From transmitter power to the level at the receiver's input; their sum is `receivedDbm`. */
  readonly entries: readonly Entry[];
  readonly receivedDbm: number;
  /** From thermal noise to system noise, signed as they add to the margin; their sum is -`noiseDbm`. */
  readonly noiseEntries: readonly Entry[];
  /** Noise power at the receiver's input in the mode's bandwidth. */
  readonly noiseDbm: number;
  readonly systemTemperatureK: number;
  readonly snrDb: number;
  /** What the mode asks for, as an entry: minus `requiredSnrDb`. */
  readonly requirement: Entry;
  readonly requiredSnrDb: number;
  readonly marginDb: number;
  readonly marginLowDb: number;
  readonly marginHighDb: number;
  /** Root-sum-square of the sigmas of all entries. */
  readonly marginSigmaDb: number;
  /** Probability that the margin is above 0, normal distribution. */
  readonly holdProbability: number;
  readonly verdict: Verdict;
  /** The ways that the signal may take, the one that this budget uses first. */
  readonly mechanisms: readonly Omit<Mechanism, "warnings">[];
  readonly transmitterCover: CoverState;
  readonly receiverCover: CoverState;
  readonly warnings: readonly Warning[];
}

/** What a covered mouth does in one weather. */
export interface CoverState {
  /** Cover in the dry against the bare feed [dB]. */
  readonly dryCostDb: Bounded;
  /** What water adds [dB]. */
  readonly waterCostDb: Bounded;
  readonly bareReturnLossDb: number;
  /** Return loss in this weather [dB]. */
  readonly returnLossDb: Bounded;
  /** Mean thickness of the water film [mm]; 0 where dry or where drops are modelled instead. */
  readonly filmMm: number;
}

/** A path between two sites, seen from both. */
export interface PathGeometry {
  readonly distanceKm: number;
  /** True heading from transmitter to receiver [deg], and back. */
  readonly headingDeg: number;
  readonly backHeadingDeg: number;
  /** Largest error of a heading that the locators leave [deg]. */
  readonly headingErrorDeg: number;
  /** Elevation at which the transmitter sees the receiver, usual bending of the ray [deg], and back. */
  readonly elevationDeg: number;
  readonly backElevationDeg: number;
  /** Distance at which the two antennas meet the smooth horizon, usual bending of the ray [km]. */
  readonly radioHorizonKm: number;
  readonly from: Site;
  readonly to: Site;
}

/** What the weather has put on the covers of an end. */
export interface Wetness {
  /** Rain that keeps a cover wet, or did until `driedForMin` ago. */
  readonly rainRateMmPerH: number;
  /** What that rain takes on the path [dB]: some wet-antenna models start from it. */
  readonly pathRainDb: number;
  readonly windMPerS: number;
  readonly temperatureC: number;
  readonly driedForMin: number;
  readonly dewMm: Bounded;
  readonly iceMm: number;
  readonly snow: Snow | undefined;
}

/** A cover over the whole dish in one weather. */
export interface DishCoverState {
  readonly entries: readonly Entry[];
  /** Shares of the power that come through, and that heat cover and water; the rest is sent back. */
  readonly passed: number;
  readonly heated: number;
  /** What permittivity and thickness at the ends of their spread change of the dry cover's loss [dB]; undefined where they have none. */
  readonly stack: Readonly<Record<"low" | "high", number>> | undefined;
  readonly stackIsSigma: boolean;
  readonly warnings: readonly Warning[];
}

/** Everything of an end that a case needs: entries of the antenna, and of the mouth by cover and weather. */
export interface PreparedEnd {
  readonly power?: Entry;
  readonly line: Entry;
  readonly antenna: readonly Entry[];
  readonly beamwidthDeg: number | undefined;
  /** Distance at which the far field begins [m]; undefined where the size is not known. */
  readonly farFieldM: number | undefined;
  /** Each cover by what a weather puts on it, for weathers that come later. */
  readonly mouthUnder: Readonly<Record<string, (wetness: Wetness | undefined) => Mouth>>;
  /** Behind a cover over the dish, which keeps the feed dry. */
  readonly isSheltered: boolean;
  readonly dishCoverOver: (wetness: Wetness | undefined) => DishCoverState;
  /** By weather name. */
  readonly dishCover: Readonly<Record<string, DishCoverState>>;
  /** By cover name, then weather name. */
  readonly mouth: Readonly<Record<string, Readonly<Record<string, Mouth>>>>;
  readonly warnings: readonly Warning[];
}

/** What other permittivity and thickness change of a dry cover, over all phases [dB]. */
export interface StackShift {
  readonly mismatchDb: number;
  readonly heatDb: number;
}

/** How a dry cover may differ from its nominal self [dB]. */
export interface CoverScatter {
  /** With permittivity and thickness at the low or the high end of their spread, loss tangents kept; undefined where they have none. */
  readonly stack: ((end: "low" | "high") => StackShift) | undefined;
  /** True where those ends are one standard deviation away, false where they end a published range. */
  readonly stackIsSigma: boolean;
  /** Of the heat, as a share of it. */
  readonly heatShare: number;
  /** Of a plane wave before a mouth that is none. */
  readonly planeWaveDb: number;
  readonly readingDb: number;
  /** How the reading scatters, where it is not normal. */
  readonly reading?: Uncertain | undefined;
}

/** A mouth taken apart for drawing: what its entries hold, and how each part may differ. */
export interface MouthParts {
  readonly coverMismatchDb: number;
  readonly coverHeatDb: number;
  readonly waterMismatchDb: number;
  readonly waterHeatDb: number;
  /** x of the loss 20 log10|1 - x e^(j psi)| that an unknown phase adds, 0 where it is known or has been read. */
  readonly beat: number;
  /** Of a known phase: what the nominal holds of it, so that another match of the feed can be told. */
  readonly tuned: CoveredFeed["tuned"];
  readonly scatter: CoverScatter;
}

/** A feed's mouth under one cover in one weather. */
export interface Mouth extends CoverState {
  readonly entries: readonly Entry[];
  readonly parts: MouthParts;
  /** Whole mismatch and whole dissipation, nominal [dB]: what the noise side needs. */
  readonly mismatchLossDb: number;
  readonly dissipationDb: number;
  readonly warnings: readonly Warning[];
}

/** The air of one weather. */
export interface PreparedWeather {
  readonly weather: Weather;
  readonly entries: readonly Entry[];
  /** Rain on the path [dB]. */
  readonly rainLossDb: number;
  /** Rain and fog on the path [dB]: what warms the beam. */
  readonly hydrometeorLossDb: number;
  readonly ambientK: number;
  readonly warnings: readonly Warning[];
}

/** A scenario after everything that does not depend on the case has been computed once. */
export interface Link {
  readonly scenario: Scenario;
  readonly path: PathGeometry;
  /** The ground between the ends; undefined where nothing is known to stand in the way. */
  readonly ground: GroundPath | undefined;
  /** Trees near the ends. */
  readonly foliage: readonly Entry[];
  /** By feed name. */
  readonly ends: Readonly<Record<EndName, Readonly<Record<string, PreparedEnd>>>>;
  readonly weathers: Readonly<Record<string, PreparedWeather>>;
  readonly modes: Readonly<Record<string, Mode>>;
  readonly doubts: Doubts;
  readonly warnings: readonly Warning[];
}
