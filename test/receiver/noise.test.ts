import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { dishGain } from "../../src/antenna/dishGain.ts";
import { dbmToWatt, wattToDbm } from "../../src/numeric/decibels.ts";
import { requiredEbN0Db } from "../../src/receiver/digital.ts";
import {
  cascadeNoiseFigureDb,
  lineLossPenaltyDb,
  noiseFigureBehindLine,
  noiseFigureDb,
  noiseTemperatureK,
  snrFromEbN0,
  snrInBandwidth,
  systemTemperatureK,
  thermalNoiseDbm,
  yFactorDb,
} from "../../src/receiver/noise.ts";
import { describeReference, num, type Row } from "../reference.ts";
import { expectPrinted, inputsOf } from "../relations.ts";

describe("noise power", () => {
  it("is -174 dBm in 1 Hz at 290 K", () => {
    // SI 2019: 1.380649e-23 J/K x 290 K = 4.0038821e-21 W/Hz
    expect(thermalNoiseDbm({ temperatureK: 290, bandwidthHz: 1 })).toBeCloseTo(
      10 * Math.log10(4.0038821e-18),
      7,
    );
  });
  it("refuses a temperature or a bandwidth of 0", () => {
    expect(() => thermalNoiseDbm({ temperatureK: 0, bandwidthHz: 500 })).toThrow("temperatureK");
    expect(() => thermalNoiseDbm({ temperatureK: 290, bandwidthHz: 0 })).toThrow("bandwidthHz");
  });
});

describe("noise figure and temperature", () => {
  it("gives 290 K for a factor of two", () => {
    // IEEE definition
    expect(noiseTemperatureK(10 * Math.log10(2))).toBeCloseTo(290, 10);
  });
  it("goes there and back", () => {
    fc.assert(
      fc.property(fc.double({ min: 0.01, max: 30, noNaN: true }), (nf) => {
        expect(noiseFigureDb(noiseTemperatureK(nf))).toBeCloseTo(nf, 9);
      }),
    );
  });
  it("refuses a negative noise figure", () => {
    expect(() => noiseTemperatureK(-0.1)).toThrow(RangeError);
  });
});

describe("a line ahead of the receiver", () => {
  it("adds dB for dB at 290 K", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 20, noNaN: true }),
        fc.double({ min: 0.1, max: 10, noNaN: true }),
        (lossDb, nf) => {
          const total = noiseFigureBehindLine({ lossDb, lineK: 290, noiseFigureDb: nf });
          expect(total).toBeCloseTo(lossDb + nf, 9);
        },
      ),
    );
  });
  it("costs more than its loss under a cold sky and less under a hot one", () => {
    const line = { lossDb: 1, lineK: 290, noiseFigureDb: 1 };
    expect(lineLossPenaltyDb({ ...line, antennaK: 20 })).toBeGreaterThan(2.9);
    expect(lineLossPenaltyDb({ ...line, antennaK: 400 })).toBeLessThan(1);
  });
  it("agrees between both planes of reference", () => {
    // The same noise referred to the line's input is l times larger than at the receiver.
    const line = { lossDb: 0.7, lineK: 280, noiseFigureDb: 1.2 };
    const atInput = 150 + noiseTemperatureK(noiseFigureBehindLine(line));
    expect(systemTemperatureK({ ...line, antennaK: 150 }) * 10 ** 0.07).toBeCloseTo(atInput, 9);
  });
});

/** The relations of the table that this program has; the others are skipped by name below. */
const relations: Record<string, (row: Row) => number> = {
  ktb_dbm: (row) => {
    const { T_k, B_hz } = inputsOf(row);
    return thermalNoiseDbm({ temperatureK: T_k!, bandwidthHz: B_hz! });
  },
  noise_floor_dbm: (row) => {
    const { NF_db, B_hz } = inputsOf(row);
    return NF_db! + thermalNoiseDbm({ temperatureK: 290, bandwidthHz: B_hz! });
  },
  nf_to_t_k: (row) => noiseTemperatureK(inputsOf(row)["NF_db"]!),
  t_to_nf_db: (row) => noiseFigureDb(inputsOf(row)["T_k"]!),
  lossy_line_nf_db: (row) => noiseFigureBehindLine(lineOf(row)),
  system_t_k: (row) => systemTemperatureK({ ...lineOf(row), antennaK: inputsOf(row)["Ta_k"]! }),
  rx_penalty_db: (row) => lineLossPenaltyDb({ ...lineOf(row), antennaK: inputsOf(row)["Ta_k"]! }),
  cascade_nf_db: (row) => {
    const { NF1_db, G1_db, NF2_db } = inputsOf(row);
    return cascadeNoiseFigureDb({
      firstNoiseFigureDb: NF1_db!,
      firstGainDb: G1_db!,
      secondNoiseFigureDb: NF2_db!,
    });
  },
  snr_rebandwidth_db: (row) => {
    const { SNR_db, B_from_hz, B_to_hz } = inputsOf(row);
    return snrInBandwidth({ snrDb: SNR_db!, fromHz: B_from_hz!, toHz: B_to_hz! });
  },
  cn0_to_snr_db: (row) => {
    const { CN0_dbhz, B_hz } = inputsOf(row);
    return snrInBandwidth({ snrDb: CN0_dbhz!, fromHz: 1, toHz: B_hz! });
  },
  ebn0_to_snr_db: (row) => {
    const { EbN0_db, Rb_bps, B_hz } = inputsOf(row);
    return snrFromEbN0({ ebN0Db: EbN0_db!, bitsPerSecond: Rb_bps!, bandwidthHz: B_hz! });
  },
  bpsk_ebn0_db: (row) => requiredEbN0Db({ keying: "coherentPhase", bitErrorRatio: inputsOf(row)["ber"]! }),
  dbpsk_ebn0_db: (row) =>
    requiredEbN0Db({ keying: "differentialPhase", bitErrorRatio: inputsOf(row)["ber"]! }),
  ncfsk_ebn0_db: (row) => requiredEbN0Db({ keying: "twoTone", bitErrorRatio: inputsOf(row)["ber"]! }),
  hot_cold_y_db: (row) => {
    const { Th_k, Tc_k, NF_db } = inputsOf(row);
    return yFactorDb({ hotK: Th_k!, coldK: Tc_k!, noiseFigureDb: NF_db! });
  },
  eirp_dbm: (row) => {
    const { P_w, G_dbi, L_db } = inputsOf(row);
    return wattToDbm(P_w!) + G_dbi! - L_db!;
  },
  w_to_dbm: (row) => wattToDbm(inputsOf(row)["P_w"]!),
  dbm_to_w: (row) => dbmToWatt(inputsOf(row)["P_dbm"]!),
  dish_gain_dbi: (row) => {
    const { D_m, eta, f_ghz } = inputsOf(row);
    return dishGain({ diameterM: D_m!, efficiency: eta!, frequencyGHz: f_ghz! }).gainDbi;
  },
};

/** Relations of the table that no model here computes: voltages, oscillators, the sun, scatter. */
const elsewhere = ["dbuv_to_dbm", "offset_hz", "sun_y_db", "gt_from_sun_dbk", "rayleigh_scatter_ratio_db"];

function lineOf(row: Row) {
  const { L_db, Tp_k, NF_db } = inputsOf(row);
  return { lossDb: L_db!, lineK: Tp_k!, noiseFigureDb: NF_db! };
}

describeReference("practice/checks-mode-noise.csv", (row) => {
  const relation = row["relation"]!;
  if (elsewhere.includes(relation)) return;
  const compute = relations[relation];
  if (compute === undefined) throw new Error(`relation ${relation} is not covered`);
  expectPrinted(row, compute(row), num(row, "expected"));
});
