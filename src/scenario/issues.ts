import type * as z from "zod";
import type { FaultPath } from "./positions.ts";
import { unknownKey } from "./wording.ts";

/** A fault at a place in the file, before line and column are known. */
export interface Fault {
  readonly code: string;
  readonly message: string;
  readonly path: FaultPath;
}

/** An issue of a schema in our words; one unknown key, one fault. */
export function faultsOf(issue: z.core.$ZodIssue, schema: z.core.$ZodType): Fault[] {
  const { path, message } = issue;
  if (issue.code === "unrecognized_keys") {
    const known = keysAt(path, schema);
    return issue.keys.map((key) => ({
      code: "unknown_key",
      message: unknownKey(key, known),
      path: [...path, key],
    }));
  }
  if (issue.code === "custom" && issue.params?.["code"] === "unknown_key") {
    return [{ code: "unknown_key", message, path }];
  }
  if (!message.startsWith("missing,")) return [{ code: "bad_value", message, path }];
  const name = String(path.at(-1));
  return [{ code: "missing_key", message: message.replace("missing", `missing key "${name}"`), path }];
}

/** The keys that the group at a path may have: a walk through the schema along the path. */
function keysAt(path: FaultPath, schema: z.core.$ZodType): string[] {
  let node = schema as z.core.$ZodTypes;
  const into = (schema: z.core.$ZodType) => {
    node = schema as z.core.$ZodTypes;
  };
  const rest = [...path];
  for (;;) {
    const { def } = node._zod;
    if (def.type === "pipe") into(def.in);
    else if (def.type === "optional") into(def.innerType);
    else if (def.type === "lazy") into(def.getter());
    else if (def.type === "object" && rest.length === 0) return Object.keys(def.shape);
    else if (def.type === "object") into(def.shape[String(rest.shift())]!);
    else {
      rest.shift();
      if (def.type === "record") into(def.valueType);
      else if (def.type === "array") into(def.element);
      else return [];
    }
  }
}
