import type { EndName } from "../scenario/types.ts";
import type { Case, Link } from "./types.ts";

/** A link with no more feeds and covers than some cases need, so that a weather more costs no more than it must. */
export function onlyWith(link: Link, cases: readonly Pick<Case, EndName>[]): Link {
  const only = (end: EndName) => {
    const feeds = [...new Set(cases.map((one) => one[end].feed))];
    const covers = [...new Set(cases.map((one) => one[end].cover))];
    return Object.fromEntries(
      feeds.map((feed) => {
        const ready = link.ends[end][feed]!;
        const some = <T>(group: Readonly<Record<string, T>>) =>
          Object.fromEntries(covers.map((cover) => [cover, group[cover]!]));
        return [feed, { ...ready, mouthUnder: some(ready.mouthUnder), mouth: some(ready.mouth) }];
      }),
    );
  };
  return { ...link, ends: { transmitter: only("transmitter"), receiver: only("receiver") } };
}
