/** How a sheet is held on a feed, and what to mind while doing so. */
export interface Fixing {
  readonly how: string;
  readonly caution: string;
}

interface Family extends Fixing {
  readonly materials: RegExp;
}

const HOOP = "stretched over a hoop so that it cannot flutter or sag";

/** The first family that a material's name fits; the last fits all. */
const families: readonly Family[] = [
  {
    materials: /PTFE.*(adhesive)/i,
    how: "by its own adhesive, lapped downwards; the edge wants a clamp as well",
    caution: "never heat it with a flame or an iron: the fumes make ill",
  },
  {
    materials: /PTFE.*(fabric|cloth)/i,
    how: HOOP,
    caution:
      "never heat it with a flame or an iron: the fumes make ill; its core is glass: cut it with a dust mask and gloves",
  },
  {
    materials: /PTFE|FEP|ETFE|PVDF/i,
    how: "clamped under a ring or band: nothing sticks to it for long",
    caution:
      "never heat it with a flame or an iron: the fumes make ill; etching it for glue is work for an industrial shop",
  },
  {
    materials: /PE\b|polyethylene|polypropylene/i,
    how: "clamped, strapped or snapped on: glues let go of it",
    caution: "keep solvents and flame treatment to a ventilated shop that knows them",
  },
  {
    materials: /expanded polystyrene|extruded polystyrene/i,
    how: "pressed in, with a skin or paint that carries no solvent",
    caution: "solvents dissolve it; it burns",
  },
  {
    materials: /glass.*(fabric|cloth)/i,
    how: HOOP,
    caution: "cut it with a dust mask and gloves",
  },
  {
    materials: /fabric|nylon|cloth/i,
    how: HOOP,
    caution: "it melts and burns: keep flames and hot tools away",
  },
  {
    materials: /polyimide|\bfilm\b/i,
    how: "stretched over the mouth and clamped under a ring or band",
    caution: "a cut edge of film is sharp: wear gloves",
  },
  {
    materials: /adhesive|hot-melt/i,
    how: "in a thin and even coat, with no bubble under the mouth",
    caution: "read its data sheet, air the room, wear gloves and eye shields; hot glue burns skin",
  },
  {
    materials: /^(ice|dry snow|wet snow|water)\b/i,
    how: "by the weather alone",
    caution: "transmitter off before anyone clears it; keep off masts and roofs in ice",
  },
  {
    materials: /glass|silica|FR-4/i,
    how: "bedded in neutral silicone or a gasket",
    caution: "wear a dust mask when cutting glass fibre, gloves and eye shields with glass",
  },
  {
    materials: /^/,
    how: "screwed or bedded in neutral silicone, with a drip edge below",
    caution: "read the data sheet of glue or silicone, air the room, wear gloves and eye shields",
  },
];

/**
 * The usual way to fix a sheet of a material, and the caution that goes with it; local rules and the data sheet
 * of the material come first.
 *
 * Source: common practice, no source
 */
export function fixingOf(material: string): Fixing {
  const { how, caution } = families.find(({ materials }) => materials.test(material))!;
  return { how, caution };
}
