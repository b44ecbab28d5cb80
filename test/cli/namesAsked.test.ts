import { describe, expect, it } from "vitest";
import { namesAsked } from "../../src/cli/namesAsked.ts";
import { UserError } from "../../src/cli/terminal.ts";
import { changedDemo, demo, oilskin, temporaryFolder } from "./run.ts";

const folder = temporaryFolder();

/** Weathers that a command's JSON tells of. */
function weathersIn(args: readonly string[]): string[] {
  const { status, stdout, stderr } = oilskin([...args, "--json"]);
  expect({ args, status, stderr }).toEqual({ args, status: 0, stderr: "" });
  const told = JSON.parse(stdout);
  const names: string[] =
    told.budgets?.map((budget: { case: { weather: string } }) => budget.case.weather) ??
    told.weathers.map((one: string | { weather: string }) => (typeof one === "string" ? one : one.weather));
  return [...new Set(names)];
}

describe("names in an option", () => {
  const known = ["dry", "wind, dry", "shower"];

  it("are all of them where none is given", () => {
    expect(namesAsked("weather", undefined, known)).toEqual(known);
  });

  it("are cut at commas only where no known name holds one", () => {
    expect(namesAsked("cover", ["film,bare", "lid"], ["bare", "film", "lid"])).toEqual([
      "film",
      "bare",
      "lid",
    ]);
    expect(namesAsked("cover", ["film, bare"], ["bare", "film"])).toEqual(["film", "bare"]);
    expect(namesAsked("weather", ["wind, dry"], known)).toEqual(["wind, dry"]);
    expect(() => namesAsked("weather", ["dry,shower"], known)).toThrow(UserError);
  });

  it("count once", () => {
    expect(namesAsked("cover", ["film", "film,bare"], ["bare", "film"])).toEqual(["film", "bare"]);
  });
});

describe.each(["budget", "covers", "path"])("oilskin %s", (command) => {
  it("takes one name an option, and leaves the file that follows alone", () => {
    expect(weathersIn([command, "--weather", "shower", demo])).toEqual(["shower"]);
  });

  it("takes the option again and again, and names with commas between them", () => {
    const both = ["dry", "shower"];
    expect(weathersIn([command, "--weather", "dry", "--weather", "shower", demo]).toSorted()).toEqual(both);
    expect(weathersIn([command, demo, "--weather", "dry,shower"]).toSorted()).toEqual(both);
  });

  it("takes a name with a comma in it", () => {
    const file = changedDemo(folder, `${command}.yaml`, "  dry: {}", "  'dry, cold': {}");
    expect(weathersIn([command, "--weather", "dry, cold", file])).toEqual(["dry, cold"]);
  });

  it("refuses a name that is none, among others that are", () => {
    const { status, stdout, stderr } = oilskin([command, "--weather", "dry,showr", demo]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toContain('no weather "showr"');
    expect(stderr).toContain("did you mean shower?");
  });
});

it("budget takes more than one cover", () => {
  const { stdout } = oilskin(["budget", "--cover", "film", "--cover", "lid", demo, "--json"]);
  const covers = JSON.parse(stdout).budgets.map(
    (budget: { case: { receiver: { cover: string } } }) => budget.case.receiver.cover,
  );
  expect(new Set(covers)).toEqual(new Set(["film", "lid"]));
});
