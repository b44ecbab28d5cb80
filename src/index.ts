/**
 * The library's face: models, scenario reader, budget engine, studies and reports.
 *
 * Names and fields of the functions listed in the project's design are kept from version to version.
 */

// Antennas
export { apertureTaper } from "./antenna/apertureTaper.ts";
export { conicalHorn } from "./antenna/conicalHorn.ts";
export { defocus } from "./antenna/defocus.ts";
export { apertureEfficiency, dishGain, nearFieldLoss } from "./antenna/dishGain.ts";
export { offAxisEnvelope } from "./antenna/envelope.ts";
export {
  feedEfficiency,
  feedExponentFromBeamwidth,
  feedExponentFromEdgeTaper,
} from "./antenna/feedEfficiency.ts";
export { pointingLoss } from "./antenna/pointing.ts";
export { optimumHorn, pyramidalHorn } from "./antenna/pyramidalHorn.ts";
// Atmosphere
export { cloudLiquidCoefficient, cloudSlantAttenuation } from "./atmosphere/cloudLiquid.ts";
export { specificGasAttenuation } from "./atmosphere/gasAttenuation.ts";
export {
  saturationPressure,
  vapourDensity,
  vapourPressureFromDensity,
  vapourPressureFromDewPoint,
  vapourPressureFromHumidity,
} from "./atmosphere/humidity.ts";
export { specificRainAttenuation } from "./atmosphere/rainAttenuation.ts";
export { monthlyRainPercent, monthlyRainRate } from "./atmosphere/rainRate.ts";
export { rainWords } from "./atmosphere/rainWords.ts";
export { rainZoneNames, zoneRainRate } from "./atmosphere/rainZones.ts";
export { referenceAtmosphere } from "./atmosphere/referenceAtmosphere.ts";
export { effectiveEarthRadius, refractivity } from "./atmosphere/refractivity.ts";
export { skyTemperature } from "./atmosphere/skyNoise.ts";
export { clearSkyTemperature, slantGasAttenuation } from "./atmosphere/slantPath.ts";
export { waterPermittivity } from "./atmosphere/waterPermittivity.ts";
// Scenario and engine
export { cases } from "./budget/cases.ts";
export { type Drawing, drawingOf } from "./budget/drawing.ts";
export type { Entry } from "./budget/entry.ts";
export { evaluate } from "./budget/evaluate.ts";
export { prepare, withWeather } from "./budget/prepare.ts";
export type { Budget, Case, Link, Warning } from "./budget/types.ts";
// Covers and feeds
export { bandRipple } from "./cover/bandRipple.ts";
export { beadedSheet } from "./cover/beads.ts";
export { coveredFeed } from "./cover/coveredFeed.ts";
export { coverNoise } from "./cover/coverNoise.ts";
export { dewFilmMm, filmAfterRain } from "./cover/drying.ts";
export { energyCheck, energyFloor } from "./cover/energyFloor.ts";
export { fixingOf } from "./cover/fixing.ts";
export { icePermittivity } from "./cover/icePermittivity.ts";
export { layeredSheet } from "./cover/layeredSheet.ts";
export { findMaterial, type Material, materials, uvClasses } from "./cover/materials.ts";
export { measuredCover } from "./cover/measuredCover.ts";
export { mixture } from "./cover/mixture.ts";
export { collectedShare, nearMouth } from "./cover/nearMouth.ts";
export { reflectionFigures } from "./cover/reflectionFigures.ts";
export { schleissWetLoss } from "./cover/schleissWetLoss.ts";
export { matchingGap, pairReturnLoss, sheetPair } from "./cover/sheetGap.ts";
export { sheetOverBeam } from "./cover/sheetOverBeam.ts";
export { snowPermittivity } from "./cover/snowPermittivity.ts";
export { surfaceState } from "./cover/surfaceState.ts";
export { waterFilm, waterLayer } from "./cover/waterFilm.ts";
export { wetAntennaLoss, wetAntennaModels } from "./cover/wetAntennaLoss.ts";
// Path
export { clearAirLoss } from "./path/clearAir.ts";
export { rainCrossPolar, rainCrossPolarOutage } from "./path/crossPolar.ts";
export { declination } from "./path/declination.ts";
export { deltaBullingtonLoss } from "./path/deltaBullington.ts";
export { multipathYear, rainYear, shorterPeriodFactor } from "./path/fadingPeriod.ts";
export { foliageLoss } from "./path/foliage.ts";
export { freeSpaceLoss } from "./path/freeSpaceLoss.ts";
export { fresnelRadius } from "./path/fresnelRadius.ts";
export { geodesicPath, pointAlong, pointsTowards } from "./path/geodesic.ts";
export { earthBulge, horizonDistance, lineOfSightLimit, rayClearance, takeOffAngle } from "./path/horizon.ts";
export { knifeEdgeLoss } from "./path/knifeEdge.ts";
export { locatorToPoint, pointToLocator } from "./path/locator.ts";
export { enhancementNotExceeded } from "./path/multipathEnhancement.ts";
export { mappedMultipathFade, multipathFade } from "./path/multipathFade.ts";
export { obstacles, raiseToClear } from "./path/obstacles.ts";
export type { Profile } from "./path/profile.ts";
export { effectiveRainLength, rainFade, rainFadePercent, scaleRainFade } from "./path/rainFade.ts";
export { rainHeight } from "./path/rainHeight.ts";
export { rainScatterLoss } from "./path/rainScatter.ts";
export { smoothEarthLoss } from "./path/smoothEarth.ts";
export { troposcatterLoss } from "./path/troposcatter.ts";
export { wetSnowFade, wetSnowPercent } from "./path/wetSnow.ts";

// Readings
export { directivityBounds } from "./readings/directivityBounds.ts";
export { inferFeedPhase } from "./readings/inferFeedPhase.ts";
export { inferSheet } from "./readings/inferSheet.ts";
export { reduceReadings } from "./readings/reduceReadings.ts";
export { readTouchstone } from "./readings/touchstone.ts";
// Receiver and safety
export { requiredEbN0Db } from "./receiver/digital.ts";
export { modes, requiredSnrInBandwidth } from "./receiver/modes.ts";
export {
  noiseFigureDb,
  noiseTemperatureK,
  snrInBandwidth,
  systemTemperatureK,
  thermalNoiseDbm,
} from "./receiver/noise.ts";
// Studies and reports
export { checkText } from "./report/checkText.ts";
export { compareCsv, compareJson } from "./report/compareData.ts";
export { compareText } from "./report/compareText.ts";
export { coversCsv, coversJson } from "./report/coversData.ts";
export { coversText } from "./report/coversText.ts";
export { horizonCsv, horizonJson } from "./report/horizonData.ts";
export { horizonText } from "./report/horizonText.ts";
export { inferCsv, inferJson } from "./report/inferData.ts";
export { inferText } from "./report/inferText.ts";
export { marginCsv, marginJson } from "./report/marginData.ts";
export { marginReportText } from "./report/marginReportText.ts";
export { materialsText } from "./report/materialsText.ts";
export { materialText } from "./report/materialText.ts";
export { pathCsv, pathJson } from "./report/pathData.ts";
export { pathText } from "./report/pathText.ts";
export { readingsCsv, readingsJson } from "./report/readingsData.ts";
export { readingsText } from "./report/readingsText.ts";
export {
  type RosterLine,
  rosterCsvHead,
  rosterCsvLines,
  rosterJsonLine,
  rosterLine,
} from "./report/rosterData.ts";
export { type RosterTable, rosterText } from "./report/rosterText.ts";
export { spreadCsv, spreadJson } from "./report/spreadData.ts";
export { spreadText } from "./report/spreadText.ts";
export { thicknessCsv, thicknessJson } from "./report/thicknessData.ts";
export { thicknessText } from "./report/thicknessText.ts";
export { weatherCsv, weatherJson } from "./report/weatherData.ts";
export { weatherText } from "./report/weatherText.ts";
export type { Meaning, Paint } from "./report/words.ts";
export { yearCsv, yearJson } from "./report/yearData.ts";
export { yearText } from "./report/yearText.ts";
export { averagePower } from "./safety/averagePower.ts";
export { cautions } from "./safety/cautions.ts";
export { exposure, exposureByGain } from "./safety/exposure.ts";
export { exposureLimits } from "./safety/exposureLimits.ts";
export { readCoordinate } from "./scenario/coordinates.ts";
export { type InferReadings, loadInferReadings } from "./scenario/infer.ts";
export { judgeScenario, loadScenario } from "./scenario/load.ts";
export { materialHint } from "./scenario/materialsMeant.ts";
export { nearest } from "./scenario/nearest.ts";
export { describeRefusal, type QuantityKind, readQuantity } from "./scenario/quantity.ts";
export { type BenchReadings, loadReadings, loadSweeps } from "./scenario/readings.ts";
export type { FileFault } from "./scenario/readingsFaults.ts";
export { openRoster, type Roster, type RosterLines, rosterLines } from "./scenario/rosterFile.ts";
export { isIdleRow, type RowFault, type RowForm, rowReader, type Station } from "./scenario/rosterRow.ts";
export { scenarioJsonSchema } from "./scenario/schema.ts";
export { TerrainError } from "./scenario/terrain/faults.ts";
export { openTerrain } from "./scenario/terrain/openTerrain.ts";
export type { ElevationSource, Terrain } from "./scenario/terrain/types.ts";
export type {
  Diagnostic,
  ReadScenario,
  Scatter,
  Scenario,
  SpreadSettings,
  Uncertain,
} from "./scenario/types.ts";
export { withMeasuredCover } from "./scenario/writeCover.ts";
export { breakEven } from "./study/breakEven.ts";
export { commonMode, commonWeathers, compare } from "./study/compare.ts";
export { coverVerdict } from "./study/coverVerdict.ts";
export { exposureOfLink } from "./study/exposureOfLink.ts";
export { type HorizonPlace, horizonRound } from "./study/horizonRound.ts";
export { inferReport } from "./study/inferReadings.ts";
export { marginReport } from "./study/marginReport.ts";
export { materialThickness } from "./study/materialThickness.ts";
export { pathStudy } from "./study/pathStudy.ts";
export { type BenchReport, benchReport } from "./study/readings.ts";
export { coversRead, entryOfCover } from "./study/readingsEntry.ts";
export { type RosterRow, rosterStudy, scoreDistanceKm } from "./study/roster.ts";
export { comparing, keepBest, keeps, type Ranked, type SortKey, sortKeys } from "./study/rosterOrder.ts";
export {
  driest,
  mostDemandingFirst,
  ownCoverFirst,
  type RosterPlan,
  type RosterSite,
  suitedDishes,
  wettest,
} from "./study/rosterPlan.ts";
export { type StationKey, seenStations, stationKey } from "./study/rosterTwice.ts";
export { spreadOf } from "./study/spread.ts";
export { thickness } from "./study/thickness.ts";
export { type LadderChoices, type WeatherLadder, weatherLadder } from "./study/weatherLadder.ts";
export { yearOutage } from "./study/yearOutage.ts";
