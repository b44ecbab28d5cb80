import { cautions } from "../safety/cautions.ts";
import { type Paint, paragraph } from "./words.ts";

/** For those who follow the advice: at the feed, at the dish in the sun, on the mast. */
export function spreadCautions(paint: Paint): string {
  const wanted = /^(Switch the transmitter off|Never look into a feed|Never look at the sun|Keep off masts)/;
  const sentences = cautions
    .flatMap((caution) => caution.sentences)
    .filter((sentence) => wanted.test(sentence));
  return [paint("strong", "Caution"), ...sentences.map((sentence) => paragraph(sentence, "  - "))].join("\n");
}
