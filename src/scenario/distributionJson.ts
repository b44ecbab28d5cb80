/**
 * The mapping form of an uncertain quantity in the JSON Schema of the scenario: written once, referred to by each
 * field that takes it. What the words must be, `distribution.ts` judges.
 */

const unit = { type: "string" };
const number = { type: ["string", "number"] };

/** The forms of `distribution.ts`, each with its keys. */
function forms(quantity: object, itself: DefinitionName) {
  const value = (description: string) => ({ ...quantity, description });
  const form = (properties: Readonly<Record<string, object>>) => ({
    type: "object",
    properties,
    required: Object.keys(properties),
    additionalProperties: false,
  });
  const part = form({
    share: { type: "string", description: "share of this part, such as 4 %" },
    of: {
      description: "what it is then: a quantity, with or without a spread, or a distribution",
      anyOf: [quantity, definedAs(itself)],
    },
  });
  return {
    normal: form({
      normal: value("the mean"),
      sigma: value("one standard deviation; in dB for powers and gains"),
    }),
    lognormal: form({
      lognormal: value("the median"),
      factor: { ...number, description: "one standard deviation multiplies or divides by it, above 1" },
    }),
    flat: form({
      flat: {
        type: "array",
        items: quantity,
        minItems: 2,
        maxItems: 2,
        description: "low and high end, all between being as likely",
      },
    }),
    exponential: form({ exponential: value("the mean; from 0 upwards") }),
    mixture: form({
      mixture: { type: "array", items: part, minItems: 1, description: "parts whose shares add up to 100 %" },
    }),
  };
}

type DefinitionName = "distribution" | "distributionOfNumber" | "normal";

/** A part of the schema that is one of the definitions. */
export function definedAs(name: DefinitionName): object {
  return { $ref: `#/definitions/${name}` };
}

/** What the fields of the schema refer to. */
export function distributionDefinitions(): Readonly<Record<DefinitionName, object>> {
  const any = "a distribution: normal and sigma, lognormal and factor, flat, exponential or mixture";
  const quantities = forms(unit, "distribution");
  return {
    distribution: { description: any, anyOf: Object.values(quantities) },
    distributionOfNumber: { description: any, anyOf: Object.values(forms(number, "distributionOfNumber")) },
    normal: { ...quantities.normal, description: "a normal distribution: normal and sigma" },
  };
}
