import { fixingOf } from "../cover/fixing.ts";
import type { Material } from "../cover/materials.ts";
import { cautions } from "../safety/cautions.ts";
import type { MaterialThickness, ThicknessSpread } from "../study/materialThickness.ts";
import { heatWords, spread, sunWords, waterWords } from "./materialWords.ts";
import { decibels, millimetres } from "./thicknessWords.ts";
import { capital, type Paint, paragraph, plain } from "./words.ts";

/** Where a material's thicknesses for orientation were computed. */
interface At {
  readonly frequencyGHz: number;
  readonly limitDb: number;
}

/** One material in full, for a terminal of 80 columns. */
export function materialText(
  material: Material,
  { halfWaveMm, thinLimitMm }: MaterialThickness,
  { frequencyGHz, limitDb }: At,
  paint: Paint = plain,
): string {
  const { name, aliases, permittivity, lossTangent, source, confidence, weatherSource, notes } = material;
  const line = (text: string) => paragraph(text, "  ");
  const electrical = [
    line(`permittivity ${spread(permittivity)}, loss tangent ${spread(lossTangent)}; value (low-high)`),
    line(`at ${material.frequencyGHz} GHz and ${material.temperatureC} degC`),
    line(`source: ${source} (${confidence})`),
  ];
  const outdoors = [
    line(sunWords(material)),
    line(waterWords(material)),
    line(heatWords(material)),
    ...(weatherSource === undefined ? [] : [line(`source: ${weatherSource}`)]),
    ...(notes === undefined ? [] : [line(`note: ${notes}`)]),
  ];
  const sizes = [
    line(`less than ${decibels(limitDb)} lost: up to ${thicknessWords(thinLimitMm)}`),
    line(`half wave: ${thicknessWords(halfWaveMm)}`),
    line("flat sheet, matched feed; `oilskin thickness` reckons with your own"),
  ];
  return `${[
    [paint("strong", name), ...(aliases.length > 0 ? [paragraph(`also: ${aliases.join(", ")}`)] : [])].join(
      "\n",
    ),
    [paint("strong", "Electrical"), ...electrical].join("\n"),
    [paint("strong", "Outdoors"), ...outdoors].join("\n"),
    [paint("strong", `Thickness at ${frequencyGHz} GHz`), ...sizes].join("\n"),
    ...(isBuiltWith(material) ? [fixingText(material, paint)] : []),
  ].join("\n\n")}\n`;
}

/** 10.10 mm (9.98-10.20 by its spread) */
function thicknessWords({ thin, nominal, thick }: ThicknessSpread): string {
  const figure = (mm: number | undefined) => (mm === undefined ? "any" : millimetres(mm).replace(" mm", ""));
  const whole = nominal === undefined ? "any thickness" : millimetres(nominal);
  const [low, high] = [figure(thin), figure(thick)];
  return low === high ? whole : `${whole} (${low} to ${high} over its spread)`;
}

/** Ice, snow and water come by themselves, and what glues other layers shows no surface to water. */
function isBuiltWith({ uvClass, wetting }: Material): boolean {
  return uvClass !== undefined && wetting !== undefined;
}

/** How it is held, and what to mind while doing so. */
function fixingText({ name }: Material, paint: Paint): string {
  return [
    paint("strong", "Fixing (common practice, no source)"),
    paragraph(`${capital(fixingOf(name).how)}.`, "  "),
    paint("strong", "Caution"),
    ...cautionsOn(name).map((sentence) => paragraph(sentence, "  - ")),
  ].join("\n");
}

/** What to mind with this material, and before any feed. */
function cautionsOn(name: string): string[] {
  const of = (hazard: string) => cautions.find((caution) => caution.hazard === hazard)!.sentences;
  const isFluoropolymer = /PTFE|FEP|ETFE|PVDF/.test(name);
  const work = of("solvents, etchants and fluoropolymers").filter((sentence) => {
    if (/fluoropolymer|etch/i.test(sentence)) return isFluoropolymer;
    return !sentence.includes("glass fibre") || name.includes("glass");
  });
  // What is particular to a fluoropolymer stands among the general sentences already.
  const own = isFluoropolymer ? [] : [`${capital(fixingOf(name).caution)}.`];
  return [
    ...own,
    ...work,
    ...of("radio-frequency exposure").filter((sentence) => sentence.startsWith("Switch")),
  ];
}
