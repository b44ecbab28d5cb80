import { modes as builtInModes } from "../receiver/modes.ts";
import { nearest } from "./nearest.ts";
import { BARE } from "./schema.ts";

/** A fault at a place in the file, before line and column are known. */
export interface Fault {
  readonly code: string;
  readonly message: string;
  readonly path: readonly PropertyKey[];
}

type Raw = Readonly<Record<string, unknown>>;

function groupAt(raw: unknown, key: string): Raw {
  const value = typeof raw === "object" && raw !== null ? (raw as Raw)[key] : undefined;
  return typeof value === "object" && value !== null ? (value as Raw) : {};
}

/**
 * Names that lead nowhere: feeds, covers, dishes and modes that the file uses and nobody defined, and ends
 * whose feed lacks what its use asks for.
 *
 * It looks at the file as typed, so that it finds these faults even beside others.
 */
export function danglingNames(raw: unknown): Fault[] {
  const feeds = groupAt(raw, "feeds");
  const dishes = groupAt(raw, "dish");
  const known = {
    feed: { noun: "feed", names: Object.keys(feeds) },
    dish: { noun: "dish", names: Object.keys(dishes) },
    cover: { noun: "cover", names: [BARE, ...Object.keys(groupAt(raw, "covers"))] },
    mode: { noun: "mode", names: [...Object.keys(builtInModes), ...Object.keys(groupAt(raw, "modes"))] },
  };
  const faults: Fault[] = [];
  const lookUp = (kind: keyof typeof known, name: unknown, path: readonly PropertyKey[]) => {
    if (typeof name !== "string" && typeof name !== "number") return;
    const { noun, names } = known[kind];
    if (names.includes(String(name))) return;
    const meant = nearest(String(name), names);
    const choice =
      names.length > 0 ? `one of ${names.join(", ")}` : `a ${noun} that the file defines (it has none)`;
    const hint = meant === undefined ? "" : ` (did you mean ${meant}?)`;
    faults.push({ code: "unknown_name", message: `no ${noun} "${name}"; expected ${choice}${hint}`, path });
  };

  for (const side of ["transmitter", "receiver"]) {
    const end = groupAt(raw, side);
    for (const kind of ["feed", "dish", "cover"] as const) lookUp(kind, end[kind], [side, kind]);
    const feed = groupAt(feeds, String(end["feed"]));
    if (!(String(end["feed"]) in feeds)) continue;
    const dish = groupAt(dishes, String(end["dish"]));
    const tapered = "edge_taper" in feed || "beamwidth_10db" in feed;
    const radiates = "gain" in feed || "pyramidal_horn" in feed || "conical_horn" in feed;
    const path = ["feeds", String(end["feed"])];
    if (end["dish"] === undefined && !radiates) {
      const message = `missing gain (or pyramidal_horn, conical_horn): the ${side} uses this feed without a dish`;
      faults.push({ code: "missing_gain", message, path });
    }
    if ("focal_ratio" in dish && !tapered) {
      const message = `missing edge_taper (or beamwidth_10db): the ${side}'s dish is given by its focal_ratio`;
      faults.push({ code: "missing_taper", message, path });
    }
  }
  const receiver = groupAt(raw, "receiver");
  const mode = receiver["mode"];
  if (Array.isArray(mode))
    for (const [i, name] of mode.entries()) lookUp("mode", name, ["receiver", "mode", i]);
  else lookUp("mode", mode, ["receiver", "mode"]);
  return faults;
}
