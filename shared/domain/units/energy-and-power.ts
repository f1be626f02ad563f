/**
 * Energy and power. Stored as kWh and kW.
 *
 * The Btu is the International Table Btu, 1055.05585262 J (NIST SP 811, appendix B.8). A ton of
 * refrigeration is 288 000 Btu a day. MBH is a thousand Btu an hour. Example: 1 ton = 3.516853 kW.
 */
export const JOULES_PER_BTU = 1055.05585262;

export type PowerUnit = "W" | "kW" | "MW" | "Btu/h" | "MBH" | "ton";
export type EnergyUnit = "kWh" | "MWh" | "MJ" | "GJ" | "kBtu" | "MMBtu" | "ton-h";

const KW_PER_BTU_PER_HOUR = JOULES_PER_BTU / 3_600_000;
const KW_PER_TON = (288_000 / 24) * KW_PER_BTU_PER_HOUR;

export const KW_PER: Readonly<Record<PowerUnit, number>> = {
  W: 0.001,
  kW: 1,
  MW: 1000,
  "Btu/h": KW_PER_BTU_PER_HOUR,
  MBH: 1000 * KW_PER_BTU_PER_HOUR,
  ton: KW_PER_TON,
};

export const KWH_PER: Readonly<Record<EnergyUnit, number>> = {
  kWh: 1,
  MWh: 1000,
  MJ: 1 / 3.6,
  GJ: 1000 / 3.6,
  kBtu: JOULES_PER_BTU / 3600,
  MMBtu: JOULES_PER_BTU / 3.6,
  "ton-h": KW_PER_TON,
};

export function toKw(value: number, unit: PowerUnit): number {
  return value * KW_PER[unit];
}

export function fromKw(powerKw: number, unit: PowerUnit): number {
  return powerKw / KW_PER[unit];
}

export function toKwh(value: number, unit: EnergyUnit): number {
  return value * KWH_PER[unit];
}

export function fromKwh(energyKwh: number, unit: EnergyUnit): number {
  return energyKwh / KWH_PER[unit];
}
