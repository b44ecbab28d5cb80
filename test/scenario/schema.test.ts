import { readdirSync, readFileSync, writeFileSync } from "node:fs";
import { Ajv, type ValidateFunction } from "ajv";
import { describe, expect, it } from "vitest";
import { parse } from "yaml";
import { kinds } from "../../src/scenario/quantity.ts";
import { scenarioJsonSchema } from "../../src/scenario/schema.ts";

const folder = new URL("../../scenarios/", import.meta.url);
const file = new URL("oilskin.schema.json", folder);
const scenarios = readdirSync(folder).filter((name) => name.endsWith(".yaml") && !name.startsWith("bench-"));
const schema = scenarioJsonSchema() as Part;

interface Part {
  readonly type?: string | string[];
  readonly description?: string;
  readonly enum?: string[];
  readonly required?: string[];
  readonly properties?: Record<string, Part>;
  readonly additionalProperties?: false | Part;
  readonly items?: Part;
  readonly anyOf?: Part[];
  readonly definitions?: Record<string, Part>;
}

/** Every part of the schema with its path; names of the user's own are written `*`, places in a list `[]`. */
function* partsOf(part: Part, path = ""): Generator<[path: string, part: Part]> {
  yield [path, part];
  for (const [key, child] of Object.entries(part.properties ?? {})) yield* partsOf(child, `${path}.${key}`);
  if (part.additionalProperties) yield* partsOf(part.additionalProperties, `${path}.*`);
  if (part.items) yield* partsOf(part.items, `${path}[]`);
  for (const choice of part.anyOf ?? []) yield* partsOf(choice, path);
  for (const [name, child] of Object.entries(part.definitions ?? {}))
    yield* partsOf(child, `${path}#${name}`);
}

function at(path: string): Part {
  const found = [...partsOf(schema)].find(([name]) => name === path);
  if (!found) throw new Error(`no ${path} in the schema`);
  return found[1];
}

const demo = () => parse(readFileSync(new URL("hilltop-contest.yaml", folder), "utf8"));

describe("the JSON Schema of the scenario file", () => {
  // Ajv compiles by the rules of draft 7 and, in strict mode, refuses keywords that it does not know.
  const validate: ValidateFunction = new Ajv({ strict: true, allowUnionTypes: true }).compile(schema);

  it("is draft 7", () => {
    expect(schema).toHaveProperty("$schema", "http://json-schema.org/draft-07/schema#");
  });

  it.each(scenarios)("takes %s as YAML gives it", (name) => {
    expect(
      validate(parse(readFileSync(new URL(name, folder), "utf8"))),
      JSON.stringify(validate.errors),
    ).toBe(true);
  });

  it.each<[why: string, spoil: (raw: ReturnType<typeof demo>) => void]>([
    ["an unknown key at the top", (raw) => Object.assign(raw, { tilte: "x" })],
    ["an unknown key of a cover", (raw) => Object.assign(raw.covers.film, { thickness: "5 mil" })],
    ["an unknown key of a layer", (raw) => Object.assign(raw.covers.film.layers[0], { colour: "red" })],
    ["a missing frequency", (raw) => delete raw.frequency],
    ["a missing thickness", (raw) => delete raw.covers.film.layers[0].thickness],
    ["a bare number where a unit is needed", (raw) => Object.assign(raw, { frequency: 10.368 })],
    ["a word that is none of the choice", (raw) => Object.assign(raw, { polarization: "slanted" })],
    ["an end that is none", (raw) => Object.assign(raw.weather.shower, { wets: ["sender"] })],
    ["a list of layers without any", (raw) => Object.assign(raw.covers.film, { layers: [] })],
    ["a text where a group is needed", (raw) => Object.assign(raw.weather, { dry: "yes" })],
    ["nothing where a group is needed", (raw) => Object.assign(raw.weather, { dry: null })],
  ])("refuses %s", (_, spoil) => {
    const raw = demo();
    expect(validate(raw)).toBe(true);
    spoil(raw);
    expect(validate(raw)).toBe(false);
  });

  it.each<[what: string, power: unknown]>([
    ["a spread", "3 W +/- 0.5 dB"],
    ["a normal one", { normal: "3 W", sigma: "0.5 dB" }],
    ["a log-normal one", { lognormal: "3 W", factor: 1.6 }],
    ["a flat one", { flat: ["10 mW", "100 mW"] }],
    ["an exponential one", { exponential: "3 W" }],
    [
      "a mixture",
      {
        mixture: [
          { share: "4 %", of: "3 W" },
          { share: "96 %", of: { flat: ["1 W", "2 W"] } },
        ],
      },
    ],
  ])("takes a quantity as %s", (_, power) => {
    const raw = demo();
    raw.transmitter.power = power;
    expect(validate(raw), JSON.stringify(validate.errors)).toBe(true);
  });

  it.each<[what: string, power: unknown]>([
    ["a bare number", 3],
    ["an empty group", {}],
    ["a sigma alone", { sigma: "0.5 dB" }],
    ["a mean alone", { normal: "3 W" }],
    ["a mean that is a bare number", { normal: 3, sigma: "0.5 dB" }],
    ["a key that is none", { flat: ["1 W", "2 W"], colour: "red" }],
    ["two distributions", { normal: "3 W", sigma: "1 dB", flat: ["1 W", "2 W"] }],
    ["three ends", { flat: ["1 W", "2 W", "3 W"] }],
    ["a mixture without parts", { mixture: [] }],
    ["a part without a share", { mixture: [{ of: "1 W" }] }],
    ["a faulty part", { mixture: [{ share: "100 %", of: { flat: ["1 W"] } }] }],
  ])("refuses a quantity as %s", (_, power) => {
    const raw = demo();
    raw.transmitter.power = power;
    expect(validate(raw)).toBe(false);
  });

  it("takes numbers in the distribution of a number, and a normal thickness alone", () => {
    const raw = demo();
    const [layer] = raw.covers.film.layers;
    layer.permittivity = { mixture: [{ share: "100 %", of: { normal: 2.1, sigma: 0.05 } }] };
    layer.thickness = { normal: "5 mil", sigma: "0.3 mil" };
    expect(validate(raw), JSON.stringify(validate.errors)).toBe(true);
    layer.thickness = { flat: ["4 mil", "6 mil"] };
    expect(validate(raw)).toBe(false);
  });

  it("describes every key", () => {
    const keys = [...partsOf(schema)].flatMap(([path, { properties = {} }]) =>
      Object.entries(properties).map(([key, { description = "" }]) => ({
        path: `${path}.${key}`,
        description,
      })),
    );
    expect(keys.length).toBeGreaterThan(60);
    expect(keys.filter(({ description }) => description.length < 5)).toEqual([]);
  });

  it("closes every group but those of the user's own names", () => {
    const open = [...partsOf(schema)]
      .filter(([, { type, additionalProperties }]) => type === "object" && additionalProperties !== false)
      .map(([path]) => path);
    expect(open.sort()).toEqual([".covers", ".dish", ".feeds", ".modes", ".weather"]);
  });

  it("offers the words of each choice", () => {
    expect(at(".polarization").enum).toEqual(["horizontal", "vertical", "circular"]);
    expect(at(".covers.*.surface").enum).toEqual(["wetting", "beading", "mixed"]);
    expect(at(".covers.*.state").enum).toEqual(["new", "weathered", "treated"]);
    expect(at(".weather.*.wets[]").enum).toEqual(["transmitter", "receiver"]);
    expect(at(".receiver.mode").description).toContain("cw, ssb");
    expect(at(".feeds.*.facing").description).toContain("level, up, down");
  });

  it("asks a text of what needs a unit, and lets a number be a number", () => {
    expect(at(".frequency").type).toBe("string");
    expect(at(".frequency").description).toContain(kinds.frequencyGHz.expected);
    expect(at(".dish.*.focal_ratio").type).toEqual(["string", "number"]);
    expect(at(".path.to.latitude").type).toEqual(["string", "number"]);
  });

  it("asks for no more than a scenario needs", () => {
    expect(schema.required).toEqual(["title", "frequency", "transmitter", "receiver", "feeds", "path"]);
    expect(at(".covers.*").required).toBeUndefined();
    expect(at(".covers.*.layers[]").required).toEqual(["material", "thickness"]);
    expect(at(".path.from").required).toEqual(["ground", "height"]);
  });

  it("stands beside the scenarios as the code has it (OILSKIN_WRITE_SCHEMA=1 writes it anew)", () => {
    if (process.env["OILSKIN_WRITE_SCHEMA"]) writeFileSync(file, `${JSON.stringify(schema, null, 2)}\n`);
    expect(JSON.parse(readFileSync(file, "utf8"))).toEqual(JSON.parse(JSON.stringify(schema)));
  });

  it.each(scenarios)("is what %s refers to in its first line", (name) => {
    const [first] = readFileSync(new URL(name, folder), "utf8").split("\n");
    expect(first).toBe("# yaml-language-server: $schema=./oilskin.schema.json");
  });
});
