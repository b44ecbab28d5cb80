import type { Link } from "../budget/types.ts";
import type { EndView, PathStudy, WeatherWays } from "../study/pathStudy.ts";
import { cell, columns, RULE } from "./columns.ts";
import { meanings, pathLines } from "./marginText.ts";
import { mechanismSentence } from "./mechanismText.ts";
import { heightCautions, warningText } from "./notes.ts";
import { profileDrawing } from "./profileDrawing.ts";
import { hundredth, type Paint, paragraph, plain, signed, tenth } from "./words.ts";

/** Obstacles past this are counted only. */
const MOST_SHOWN = 9;

/** A path for a terminal of 80 columns: what carries it first, then geometry, obstacles, days and a drawing. */
export function pathText(study: PathStudy, link: Link, paint: Paint = plain): string {
  const heading = (text: string) => paint("strong", paragraph(text));
  const parts = [
    pathLines(study, link, paint),
    answer(study, link),
    `${heading(headingsTitle(study))}\n${headingsTable(study)}`,
    `${heading("Obstacles: clearance in metres and in first Fresnel zones")}\n${obstacleTable(study)}`,
    `${heading("Metres to add to an antenna to clear 0.6 of the zone")}\n${raiseTable(study)}`,
    ...study.weathers.map(
      (one) =>
        `${heading(`Ways for the signal in ${one.weather}, ${link.modes[study.mode]!.label}`)}\n${waysTable(one, study, paint)}`,
    ),
    `${heading("The normal day and the lift by P.452-18: losses in dB not exceeded")}\n${daysText(study)}`,
    `${heading(`The path from the side, over ${groundWords(study)}`)}\n${profileDrawing(study)}`,
    airText(study),
    warningText(study.warnings, paint),
    heightCautions(paint),
  ];
  return `${parts.filter((part) => part !== "").join("\n\n")}\n`;
}

function groundWords({ ground }: PathStudy): string {
  return ground === "terrain" ? "the terrain" : "a smooth Earth at sea level (no terrain is given)";
}

/** Metres of height: to a tenth where it matters. */
function height(m: number): string {
  return `${m < 10 ? tenth(m) : Math.round(m)} m`;
}

/** What carries the path in each weather, and how the ray passes the worst obstacle. */
function answer(study: PathStudy, link: Link): string {
  const { label } = link.modes[study.mode]!;
  const worst = study.obstacles.reduce((a, b) => (b.zones < a.zones ? b : a));
  const { raise } = study;
  const place = `at ${worst.distanceKm.toFixed(1)} km`;
  const sight = study.inSight
    ? `The ray passes ${height(worst.clearanceM)} over the ground where it comes nearest, ${place}: ` +
      `${tenth(worst.zones)} of the first Fresnel zone.`
    : `The ray is cut: it passes ${height(-worst.clearanceM)} below the top ${place}.`;
  const higher =
    raise.median.bothM > 0
      ? ` Both antennas ${height(Math.ceil(raise.median.bothM))} higher would clear 0.6 of the zone.`
      : "";
  return [
    ...study.weathers.map((one) => mechanismSentence(one.weather, label, one.verdict, one.ways)),
    sight + higher,
    ...(study.ground === "terrain"
      ? []
      : ["No terrain is given: hills, trees and buildings may stand in the way."]),
  ]
    .map((sentence) => paragraph(sentence))
    .join("\n");
}

function headingsTitle({ date, magneticModel }: PathStudy): string {
  return magneticModel === undefined
    ? "Headings, true"
    : `Headings on ${date}, magnetic ones by ${magneticModel}, declination east +`;
}

function headingsTable({ transmitter, receiver, path }: PathStudy): string {
  const degrees = (value: number | undefined) => (value === undefined ? "-" : tenth(value));
  const row = (end: string, view: EndView) => [
    cell(end),
    ...[degrees(view.trueDeg), degrees(view.magneticDeg), declinationWords(view.declinationDeg)].map((text) =>
      cell(text),
    ),
    cell(hundredth(view.elevationDeg)),
    cell(
      view.horizon === undefined
        ? "other end in sight"
        : `${hundredth(view.horizon.elevationDeg)} at ${view.horizon.distanceKm.toFixed(1)} km`,
    ),
  ];
  return [
    columns([
      ["looking", "true", "magnetic", "declination", "elevation", "horizon"].map((text) => cell(text)),
      RULE,
      row("out", transmitter),
      row("back", receiver),
    ]),
    paragraph(
      `deg; ${path.distanceKm.toFixed(2)} km; antennas ${Math.round(transmitter.antennaAmslM)} and ` +
        `${Math.round(receiver.antennaAmslM)} m above sea level`,
    ),
  ].join("\n");
}

/** Signed, with its letter. */
function declinationWords(deg: number | undefined): string {
  if (deg === undefined) return "-";
  return `${signed(deg)} (${tenth(Math.abs(deg))} ${deg < 0 ? "W" : "E"})`;
}

function obstacleTable({ obstacles, settings }: PathStudy): string {
  const k = (value: number) => `k = ${value.toFixed(2)}`;
  const shown = obstacles.slice(0, MOST_SHOWN);
  const table = columns([
    [
      ...["", "", "", "", ""].map((text) => cell(text)),
      { text: k(settings.k), across: 2 },
      cell(""),
      { text: k(settings.kLow), across: 2 },
      cell(""),
    ],
    ["", "at km", "top m", "over km", "F1 m", "m", "zones", "m", "zones"].map((text) => cell(text)),
    RULE,
    ...shown.map(({ distanceKm, topM, coverM, widthKm, fresnelM, clearanceM, zones, low }, i) =>
      [
        `${i + 1}${coverM > 0 ? " wooded" : ""}`,
        distanceKm.toFixed(1),
        topM.toFixed(0),
        widthKm === 0 ? "clear" : widthKm.toFixed(1),
        fresnelM.toFixed(1),
        signed(clearanceM),
        zones.toFixed(2),
        signed(low.clearanceM),
        low.zones.toFixed(2),
      ].map((text) => cell(text)),
    ),
  ]);
  const left = obstacles.length - shown.length;
  return left === 0 ? table : `${table}\nand ${left} more`;
}

function raiseTable({ raise, settings }: PathStudy): string {
  const row = (k: number, { txM, rxM, bothM }: PathStudy["raise"]["median"]) =>
    [
      `k = ${k.toFixed(2)}`,
      ...[txM, rxM, bothM].map((m) => (m === 0 ? "none" : Math.ceil(m).toString())),
    ].map((text) => cell(text));
  return columns([
    ["", "transmitter alone", "receiver alone", "both"].map((text) => cell(text)),
    RULE,
    row(settings.k, raise.median),
    row(settings.kLow, raise.low),
  ]);
}

function waysTable({ verdict, ways }: WeatherWays, study: PathStudy, paint: Paint): string {
  const worst = Math.min(...study.obstacles.map(({ clearanceM }) => clearanceM));
  const cut = study.inSight
    ? []
    : [[cell("  line of sight"), cell(`cut by ${height(-worst)}`), cell(""), cell(""), cell("")]];
  return columns([
    ["way", "loss dB", "excess dB", "sigma", "margin dB"].map((text) => cell(text)),
    RULE,
    ...cut,
    ...ways.map(({ label, lossDb, excessDb, sigmaDb, marginDb, carries }) => {
      const figure = tenth(marginDb);
      return [
        cell(`${carries ? "*" : " "} ${label}`),
        cell(tenth(lossDb)),
        cell(tenth(excessDb)),
        cell(tenth(sigmaDb)),
        cell(figure, carries ? paint(meanings[verdict], figure) : figure),
      ];
    }),
  ]);
}

function daysText({ days, dayWeather }: PathStudy): string {
  const words = (percent: number) => (percent === 50 ? "normal day, 50 %" : `lift, ${percent} %`);
  const table = columns([
    ["time of the year", "along ground", "troposcatter", "ducting", "together", "margin dB"].map((text) =>
      cell(text),
    ),
    RULE,
    ...days.map(({ percent, lossDb, alongGroundDb, troposcatterDb, ductingDb, marginDb }) => [
      cell(words(percent)),
      ...[alongGroundDb, troposcatterDb, ductingDb, lossDb, marginDb].map((db) => cell(tenth(db))),
    ]),
  ]);
  const note = `Gas included; margins as in ${dayWeather}, without rain and fog on the path.`;
  return `${table}\n${paragraph(note)}`;
}

/** What the figures rest on. */
function airText({ settings: { k, kLow, N0, dN }, weathers }: PathStudy): string {
  const scattered = weathers.some(({ ways }) => ways.some(({ name }) => name === "rain_scatter"));
  const raised = scattered ? "Rain scatter takes a cell half-way and both beams raised to it. " : "";
  return paragraph(
    `*: carries the path; excess: beyond free space. ${raised}Air: k = ${k.toFixed(2)} usually and ${kLow.toFixed(2)} at its lowest, N0 = ` +
      `${Math.round(N0)}, dN = ${Math.round(dN)} N-units a km; the scenario's path may state them.`,
  );
}
