/**
 * The gas data as the science uses them. Every datum carries where it comes from and whether its
 * text was read; values come from templates/gases and are checked and frozen by the catalogue.
 */

/** Id of a species (`He`, `SF6`, ...). The pseudo-species `air` is dry air and is not listed. */
export type GasId = string;

/** Mole fractions by gas id; `air` stands for dry air, or humid air where a humidity is given. */
export type Composition = Readonly<Record<GasId, number>>;

export interface Sourced {
  readonly source: string;
  readonly status: 'verified' | 'from memory';
  readonly note?: string;
}

export interface TemperatureSpan {
  readonly temperatureMinK: number;
  readonly temperatureMaxK: number;
}

export interface MolarMass extends Sourced {
  readonly molarMassKgPerMol: number;
}

/** cp/R = a1/T^2 + a2/T + a3 + a4 T + a5 T^2 + a6 T^3 + a7 T^4. */
export interface HeatCapacity extends Sourced, TemperatureSpan {
  readonly coefficients: readonly number[];
  readonly worstErrorPercent260To320K?: number;
  readonly worstFitErrorPercent?: number;
}

export interface CriticalConstants extends Sourced {
  readonly temperatureK: number;
  readonly pressurePa: number;
  readonly molarVolumeM3PerMol: number;
  readonly acentricFactor: number;
  readonly molarVolumeStatus?: Sourced['status'];
}

/** B(T) = sum over k of b_k (300 K/T)^k, k = 0..4. */
export interface SecondVirialFit extends Sourced, TemperatureSpan {
  readonly coefficientsM3PerMol: readonly number[];
  readonly worstFitErrorM3PerMol: number;
}

/** Z = 1 + B rho + sum over j >= 2 of C_j(T) u^j, u = rho/(1e4 mol/m3), C_j = sum c_ji (300 K/T)^i. */
export interface DensitySeries extends Sourced, TemperatureSpan {
  readonly coefficients: readonly (readonly number[])[];
  readonly pressureMaxPa: number;
  readonly worstErrorPercent: number;
  readonly use: 'compressed' | 'residualVapour';
}

/** ln(p/pc) = (Tc/T)(n1 th + n2 th^1.5 + n3 th^2.5 + n4 th^5), th = 1 - T/Tc. */
export interface VapourPressureFit extends Sourced, TemperatureSpan {
  readonly coefficients: readonly number[];
  readonly worstFitErrorPercent: number;
}

export interface PhaseChange extends Sourced {
  readonly change: 'boiling' | 'sublimation';
  readonly boilingTemperatureK?: number;
  readonly sublimationTemperatureK?: number;
  readonly latentHeatJPerKg: number;
  readonly liquidDensityAtBoilingKgPerM3?: number;
  readonly gasDensityAtBoilingKgPerM3?: number;
  readonly solidDensityKgPerM3?: number;
  readonly solidDensityStatus?: Sourced['status'];
  readonly gasDensityAtSublimationKgPerM3?: number;
  readonly triplePointTemperatureK?: number;
  readonly triplePointPressurePa?: number;
  readonly liquidDensityAtTriplePointKgPerM3?: number;
  readonly latentHeatOfVaporisationAtTriplePointJPerKg?: number;
  readonly expansionRatioLiquidToGas20C?: number;
  readonly expansionRatioSolidToGas20C?: number;
  readonly expansionRatioLiquidAt20CToGas20C?: number;
}

export interface RoomDensity extends Sourced {
  readonly densityAt15C101325PaKgPerM3: number;
  readonly densityAt20C101325PaKgPerM3: number;
}

/** How the gas stands in its container at 20 degC, and so how its content is found. */
export interface ContainerState extends Sourced {
  readonly stateAt20C: 'compressed' | 'liquefied' | 'nearCritical';
  readonly contentBy: 'pressure' | 'mass';
  readonly vapourPressureAt20CPa?: number;
  readonly vapourPressureAt15CPa?: number;
  readonly liquidDensityAt20CKgPerM3?: number;
  readonly vapourDensityAt20CKgPerM3?: number;
  readonly latentHeatAt20CJPerKg?: number;
}

export interface ViscosityPoint extends Sourced {
  readonly kinematicViscosityM2PerS: number;
  readonly prandtlNumber: number;
  readonly temperatureK: number;
  readonly pressurePa: number;
}

/** Where the heat capacity stops following the sound wave. */
export interface Relaxation extends Sourced {
  readonly frequencyHzAt1Atm: number;
  readonly frequencyMinHz: number;
  readonly frequencyMaxHz: number;
  readonly effect: string;
}

export interface FlammabilityLimits extends Sourced {
  readonly lowerLimitPercent: number | null;
  readonly upperLimitPercent: number | null;
}

export interface Flammability extends FlammabilityLimits {
  readonly flammable: boolean;
  readonly oxidising: boolean;
  readonly flammableAt20C?: boolean;
  readonly iso817Class?: string;
  readonly alternative?: FlammabilityLimits;
}

export interface WarmingPotential extends Sourced {
  readonly gwp100Ar4: number | null;
  readonly gwp100Ar5: number | null;
  readonly gwp100Ar6: number | null;
  readonly gwp100Eu2024573: number | null;
  readonly gwp100Ar6FirstPrinting?: number;
  readonly isEuFluorinatedGas: boolean;
  readonly ar5Qualifier?: string;
  readonly ar5Status?: Sourced['status'];
  readonly euStatus?: Sourced['status'];
}

export interface TransportEntry {
  readonly form: string;
  readonly unNumber: string;
  readonly properName: string;
  readonly adrClass: string;
  readonly classificationCode: string;
  readonly labels: string;
}

export interface Transport extends Sourced {
  readonly entries: readonly TransportEntry[];
  readonly classificationStatus: Sourced['status'];
}

export interface GasSpecies {
  readonly id: GasId;
  readonly name: string;
  readonly formula: string;
  readonly identity: Sourced & { readonly casNumber: string };
  readonly molarMass: MolarMass;
  readonly heatCapacity: HeatCapacity;
  readonly critical: CriticalConstants;
  readonly quantumCritical?: CriticalConstants;
  readonly secondVirial: SecondVirialFit;
  readonly densitySeries?: DensitySeries;
  readonly vapourPressure?: VapourPressureFit;
  readonly phase: PhaseChange;
  readonly roomDensity?: RoomDensity;
  readonly container?: ContainerState;
  readonly viscosity?: ViscosityPoint;
  readonly relaxation?: Relaxation;
  readonly flammability: Flammability;
  readonly warmingPotential: WarmingPotential;
  readonly odour: Sourced & { readonly description: string };
  readonly transport: Transport;
  readonly remark?: Sourced & { readonly text: string };
}

export interface MoleFractionSet extends Sourced {
  readonly moleFractions: Composition;
}

export interface DryAir {
  readonly name: string;
  /** Four components: the air of every mixture here. */
  readonly composition: MoleFractionSet;
  readonly traceComposition: MoleFractionSet;
  readonly molarMass: MolarMass;
  readonly secondVirial: SecondVirialFit;
  readonly densitySeries: DensitySeries;
  readonly viscosity: ViscosityPoint;
  readonly transport: Transport;
}

export interface SaturationFit extends Sourced, TemperatureSpan {
  readonly coefficients: readonly number[];
}

export interface HumidAir {
  /** ln(e/Pa) = g0/T^2 + g1/T + g2 + g3 T + g4 T^2 + g5 T^3 + g6 T^4 + g7 ln T. */
  readonly saturationPressureWater: SaturationFit;
  /** ln(e/Pa) = k0/T + k1 + k2 T + k3 T^2 + k4 T^3 + k5 ln T. */
  readonly saturationPressureIce: SaturationFit;
  /** f = alpha + beta p + gamma t^2, t in degC. */
  readonly enhancementFactor: Sourced &
    TemperatureSpan & {
      readonly alpha: number;
      readonly betaPerPa: number;
      readonly gammaPerC2: number;
      readonly pressureMinPa: number;
      readonly pressureMaxPa: number;
    };
}

export interface InversePowers {
  readonly coefficients: readonly number[];
  readonly powers: readonly number[];
}

/** B pc/(R Tc) = f0(T/Tc) + omega f1(T/Tc); f = sum of coefficient/(T/Tc)^power. */
export interface Tsonopoulos extends Sourced {
  readonly f0: InversePowers;
  readonly f1: InversePowers;
}

/** Tc = Tc0/(1 + temperatureTerm/(M T)), pc = pc0/(1 + pressureTerm/(M T)), M in g/mol. */
export interface QuantumCorrection extends Sourced {
  readonly temperatureTermGKPerMol: number;
  readonly pressureTermGKPerMol: number;
}

/** Correction of the critical temperature of a pair: Tc12 = sqrt(Tc1 Tc2)(1 - k12). */
export interface PairCorrections extends Sourced {
  readonly default: number;
  readonly pairs: readonly { readonly between: readonly GasId[]; readonly value: number }[];
}

export interface GasLibrary {
  readonly species: Readonly<Record<GasId, GasSpecies>>;
  readonly gasConstant: Sourced & { readonly jPerMolK: number };
  readonly dryAir: DryAir;
  readonly humidAir: HumidAir;
  readonly tsonopoulos: Tsonopoulos;
  readonly quantumCorrection: QuantumCorrection;
  readonly k12: PairCorrections;
}
