/** Plain words of warning, one list a hazard; none of them replaces local rules or a trained person. */
export interface Caution {
  readonly hazard: string;
  readonly sentences: readonly string[];
}

/**
 * Source: common practice, no source, where the sentence names none
 */
export const cautions: readonly Caution[] = [
  {
    hazard: "radio-frequency exposure",
    sentences: [
      "Every figure is an estimate on the axis, for average power; it does not show that a place may be entered.",
      "Keep people out of the space in front of feed and dish while there may be power.",
      "Never look into a feed, a guide or a horn that may be powered: eyes heat easily.",
      "Switch the transmitter off and take away its key before anyone touches the feed or its cover.",
      "Local exposure rules bind; ask a competent person wherever people can reach the beam.",
    ],
  },
  {
    hazard: "masts and height",
    sentences: [
      "Climb only trained, with fall protection, and with nobody below without a hard hat.",
      "Keep off masts and roofs in wind, rain or ice.",
      "Guy and ballast every tripod; wind turns a dish into a sail.",
      "Local building and work rules apply, and a licensed rigger knows them.",
    ],
  },
  {
    hazard: "lightning",
    sentences: [
      "Stop at the first thunder, leave the mast and do not wait for rain.",
      "A licensed electrician bonds and earths masts and lines to the local code.",
    ],
  },
  {
    hazard: "power lines and supplies",
    sentences: [
      "Stay farther from overhead lines than mast and antenna together are long, whichever way they may fall.",
      "Outdoors, put mains and generators behind a residual-current device and keep connections dry.",
      "Fuse both leads of a battery.",
      "Fixed wiring is the work of a licensed electrician under the local code.",
    ],
  },
  {
    hazard: "solvents, etchants and fluoropolymers",
    sentences: [
      "Never heat a fluoropolymer film with a flame, an iron or a hot-air gun: its fumes make ill.",
      "Sodium etchants for bonding fluoropolymers ignite in moisture and are work for an industrial shop.",
      "Clamp the film, or buy it etched, rather than etch it.",
      "For glues, silicones and solvents read the data sheet, air the room, and wear gloves and eye shields.",
      "Wear a dust mask when drilling or sanding glass fibre.",
      "Local rules on chemicals and waste apply.",
    ],
  },
  {
    hazard: "the sun in a dish",
    sentences: [
      "A dish pointed at the sun gathers its heat at the feed and can burn skin, cables and covers.",
      "Never look at the sun along a dish; find it by the shadow of the feed.",
      "Do not leave a bright or metallised dish aimed where the sun will cross the beam.",
      "Local fire and work rules apply to a dish that gathers sunlight.",
    ],
  },
];
