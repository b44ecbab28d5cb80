import { requireWithin } from "../numeric/check.ts";

/**
 * Mean height of the top of the rain above mean sea level, by latitude alone.
 *
 *     5 km in the tropics, falling by 0.075 km a degree north of 23 deg and by 0.1 km a degree south of -21 deg
 *
 * Source: ITU-R P.839-2, from memory; later versions take the height from maps
 *
 * @param latitudeDeg  [deg], north positive
 * @returns height [km], at least 0
 * @throws RangeError on a latitude beyond a pole
 */
export function rainHeight({ latitudeDeg }: { readonly latitudeDeg: number }): { readonly heightKm: number } {
  requireWithin("latitudeDeg", latitudeDeg, -90, 90);
  if (latitudeDeg > 23) return { heightKm: Math.max(0, 5 - 0.075 * (latitudeDeg - 23)) };
  if (latitudeDeg < -21) return { heightKm: Math.max(0, 5 + 0.1 * (latitudeDeg + 21)) };
  return { heightKm: 5 };
}
