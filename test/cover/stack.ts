import type { Layer } from "../../src/cover/layeredSheet.ts";

/** "eps/tan/mm|eps/tan/mm" of the reference tables. */
export function parseStack(text: string): Layer[] {
  return text.split("|").map((part) => {
    const [permittivity, lossTangent, thicknessMm] = part.split("/").map(Number) as [number, number, number];
    return { permittivity, lossTangent, thicknessMm };
  });
}
