import { Command } from "commander";
import {
  findMaterial,
  type Material,
  materialHint,
  materials,
  materialsText,
  materialText,
  materialThickness,
} from "../index.ts";
import { paintFor, print, UserError } from "./terminal.ts";

/** Where and for what loss the thicknesses of a material are told. */
const ORIENTATION = { frequencyGHz: 10.368, limitDb: 0.1 };

export const materialsCommand = new Command("materials")
  .description("list the cover materials with their figures, durability and source, or tell all of one")
  .argument("[name...]", "material, in full")
  .action(async (words: string[]) => {
    const paint = paintFor(process.stdout);
    if (words.length === 0) {
      print(await materialsText(materials, paint));
      return;
    }
    const material = known(words.join(" "));
    print(materialText(material, materialThickness(material, ORIENTATION), ORIENTATION, paint));
  });

function known(name: string): Material {
  const material = findMaterial(name);
  if (material !== undefined) return material;
  throw new UserError(`no material "${name}"${materialHint(name)}`);
}
