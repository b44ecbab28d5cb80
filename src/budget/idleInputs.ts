import type { Weather } from "../scenario/types.ts";
import type { Warning } from "./types.ts";

/**
 * What a weather states without any effect: typed for a reason, so that silence would mislead.
 *
 * @param where  name of the weather in the scenario
 */
export function idleInputs(weather: Weather, where: string): Warning[] {
  const { rainMmPerH, rainFadeDb, extentKm, fogGPerM3, fogExtentKm, temperatureC, wets } = weather;
  const { coversWetAsAtMmPerH, driedForMin, dewMm, iceMm, snow } = weather;
  const idle = (key: string, message: string): Warning => ({
    code: "idle_input",
    message,
    where: `${where}.${key}`,
  });
  const raining = rainMmPerH.value > 0 || rainFadeDb !== undefined;
  const deposits = [
    ...(coversWetAsAtMmPerH === undefined || coversWetAsAtMmPerH === 0 ? [] : ["covers_wet_as_at"]),
    ...(dewMm.value === 0 ? [] : ["dew"]),
    ...(iceMm === 0 ? [] : ["ice"]),
    ...(snow === undefined ? [] : ["snow"]),
  ];
  return [
    ...(extentKm !== undefined && !raining ? [idle("extent", "does nothing without rain")] : []),
    ...(fogExtentKm !== undefined && fogGPerM3 === 0 ? [idle("fog_extent", "does nothing without fog")] : []),
    ...(driedForMin > 0 && (coversWetAsAtMmPerH ?? rainMmPerH.value) === 0
      ? [idle("dried_for", "does nothing without covers_wet_as_at, the rain that wetted the covers")]
      : []),
    ...(wets.length === 0 ? deposits.map((key) => idle(key, "does nothing, as wets names no end: []")) : []),
    ...(iceMm > 0 && (temperatureC ?? 0) > 0
      ? [idle("ice", `ice melts at ${temperatureC} degC; it is taken as ice of 0 degC all the same`)]
      : []),
  ];
}
