import { modes as builtInModes } from "../receiver/modes.ts";
import { faultOfText } from "./fields.ts";
import type { Fault } from "./issues.ts";
import type { FaultPath } from "./positions.ts";
import { isGroup, type Raw } from "./raw.ts";
import { BARE } from "./schema.ts";
import { didYouMean, listed, shown } from "./wording.ts";

/** The group under a key of a group; an empty one where there is none. */
function groupAt(raw: unknown, key: string): Raw {
  const value = isGroup(raw) && Object.hasOwn(raw, key) ? raw[key] : undefined;
  return isGroup(value) ? value : {};
}

function hasAny(group: Raw, ...keys: string[]): boolean {
  return keys.some((key) => Object.hasOwn(group, key));
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
  const covers = groupAt(raw, "covers");
  const known = {
    feed: Object.keys(feeds),
    dish: Object.keys(dishes),
    cover: [...new Set([BARE, ...Object.keys(covers)])],
    mode: [...new Set([...Object.keys(builtInModes), ...Object.keys(groupAt(raw, "modes"))])],
  };
  const faults: Fault[] = [];
  const lookUp = (noun: keyof typeof known, name: unknown, path: FaultPath) => {
    const names = known[noun];
    if (typeof name !== "string" || faultOfText(name) || names.includes(name)) return;
    const choice = names.length > 0 ? listed(names) : `a ${noun} that the file defines (it has none)`;
    const message = `no ${noun} ${shown(name)}, expected ${choice}${didYouMean(name, names)}`;
    faults.push({ code: "unknown_name", message, path });
  };

  for (const side of ["transmitter", "receiver"]) {
    const end = groupAt(raw, side);
    for (const noun of ["feed", "dish", "cover"] as const) lookUp(noun, end[noun], [side, noun]);
    lookUp("cover", end["dish_cover"], [side, "dish_cover"]);
    if (hasAny(end, "dish_cover") && !hasAny(end, "dish")) {
      const message = `a dish_cover without a dish; a cover on the ${side}'s feed goes under cover`;
      faults.push({ code: "no_dish", message, path: [side, "dish_cover"] });
    }
    faults.push(...unsuitedFeed(side, end, feeds, dishes));
  }
  const { mode } = groupAt(raw, "receiver");
  if (Array.isArray(mode)) {
    for (const [i, name] of mode.entries()) lookUp("mode", name, ["receiver", "mode", i]);
  } else lookUp("mode", mode, ["receiver", "mode"]);
  if (hasAny(groupAt(covers, BARE), "layers", "measured")) {
    const message = `${BARE} is the mouth without a cover; give this cover another name`;
    faults.push({ code: "bare_covered", message, path: ["covers", BARE] });
  }
  return faults;
}

/** What the feed of an end lacks for a dish given by its focal ratio, or for use without a dish. */
function unsuitedFeed(side: string, end: Raw, feeds: Raw, dishes: Raw): Fault[] {
  const name = String(end["feed"]);
  const feed = groupAt(feeds, name);
  if (!hasAny(feeds, name)) return [];
  const path = ["feeds", name];
  if (!hasAny(end, "dish") && !hasAny(feed, "gain", "pyramidal_horn", "conical_horn")) {
    const message = `missing gain (or pyramidal_horn, conical_horn): the ${side} uses this feed without a dish`;
    return [{ code: "missing_gain", message, path }];
  }
  const dish = groupAt(dishes, String(end["dish"]));
  if (hasAny(dish, "focal_ratio") && !hasAny(feed, "edge_taper", "beamwidth_10db")) {
    const message = `missing edge_taper (or beamwidth_10db): the ${side}'s dish is given by its focal_ratio`;
    return [{ code: "missing_taper", message, path }];
  }
  return [];
}
