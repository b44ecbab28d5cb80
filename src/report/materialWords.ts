import type { Bounded } from "../cover/bounded.ts";
import type { Material } from "../cover/materials.ts";

/** Permittivity or loss tangent with its published spread. */
export function spread({ nominal, low, high }: Bounded): string {
  return low === high ? String(nominal) : `${nominal} (${low}-${high})`;
}

/** How it lasts in sunlight, as a clause. */
export function sunWords({ uvClass, uvWords }: Material): string {
  return uvWords === undefined ? "sun: not known" : `sun: ${uvWords} (class ${uvClass})`;
}

/** How water lies on it and how much it takes up. */
export function waterWords({ wetting, contactAngleDeg, waterUptakePercent }: Material): string {
  const lies = wetting ?? "behaviour not known";
  const angle = contactAngleDeg === undefined ? "" : `, contact angle ${contactAngleDeg} deg`;
  const soaks = waterUptakePercent === undefined ? "" : `, takes up ${waterUptakePercent} % in a day`;
  return `water: ${lies}${angle}${soaks}`;
}

/** Temperatures that it bears in use. */
export function heatWords({ serviceMinC, serviceMaxC }: Material): string {
  return serviceMinC === undefined || serviceMaxC === undefined
    ? "use: temperatures not known"
    : `use: ${serviceMinC} to ${serviceMaxC} degC`;
}
