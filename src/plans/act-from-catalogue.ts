import type {
  CataloguePlannedRelease,
  CatalogueWorstRelease,
  Demonstration,
  Policy,
} from '../assessment/catalogue-types.js';
import type { PlanRelease, PlanSound, PlanVenue, PhysicalFigure } from '../assessment/plan-file.js';
import { policyDefault } from '../assessment/policy-rows.js';
import { standardPressure } from '../science/atmosphere.js';
import { planningContentMol } from '../science/gases/container-content.js';
import type { GasLibrary } from '../science/gases/gas-library.js';
import { molarVolumeM3PerMol } from '../science/gases/molar-volume.js';

export interface SiteState {
  readonly temperatureK: number;
  readonly pressurePa: number;
}

const stated = (figure: PhysicalFigure | undefined): number | undefined =>
  typeof figure === 'number' ? figure : figure?.value;

/** Temperature and pressure that gas volumes of a plan at this venue are counted at. */
export function siteState(venue: PlanVenue, policy: Policy): SiteState {
  const { site } = venue;
  return {
    temperatureK: stated(site.temperatureK) ?? policyDefault(policy, 'siteTemperatureK').value,
    pressurePa: stated(site.pressurePa) ?? standardPressure(stated(site.altitudeM) ?? 0),
  };
}

// Three digits: the catalogue's figures are not known better than that.
const settled = (value: number): number => Number(value.toPrecision(3));

function content(
  release: CatalogueWorstRelease,
  site: SiteState,
  gases: GasLibrary,
): Pick<PlanRelease, 'massKg' | 'volumeM3'> | undefined {
  const { container } = release;
  if (container?.massKg !== undefined) return { massKg: container.massKg };
  if (container?.waterVolumeM3 === undefined || container.pressurePa === undefined) {
    return undefined;
  }
  const composition = release.composition ?? { [release.gas ?? 'air']: 1 };
  const { waterVolumeM3, pressurePa, temperatureK = 288.15 } = container;
  const amountMol = planningContentMol(gases, {
    composition,
    waterVolumeM3,
    pressurePa,
    temperatureK,
  });
  return {
    volumeM3: settled(amountMol * molarVolumeM3PerMol(site.temperatureK, site.pressurePa)),
  };
}

function amount(
  release: CataloguePlannedRelease | CatalogueWorstRelease,
  which: 'typical' | 'high',
  scale: number,
): Pick<PlanRelease, 'massKg' | 'volumeM3'> {
  if (release.massKg !== undefined) return { massKg: release.massKg[which] };
  if (release.volumeM3 !== undefined) return { volumeM3: settled(release.volumeM3[which] * scale) };
  return {};
}

function planRelease(
  release: CataloguePlannedRelease | CatalogueWorstRelease,
  released: Pick<PlanRelease, 'massKg' | 'volumeM3'>,
): PlanRelease {
  const { title, gas, composition, manner, profile, timeConstantS, burned } = release;
  return {
    title,
    ...(gas !== undefined && { gas }),
    ...(composition !== undefined && { composition }),
    ...released,
    durationS: release.durationS.typical,
    heightM: release.heightM.typical,
    manner,
    profile,
    ...(timeConstantS !== undefined && { timeConstantS }),
    ...(burned !== undefined && { burned }),
  };
}

/** An act that still needs its place and time. */
export interface DraftAct {
  readonly title: string;
  readonly catalogueId: string;
  readonly releases: {
    readonly planned: readonly PlanRelease[];
    readonly worstCredible: readonly PlanRelease[];
  };
  readonly sound: readonly PlanSound[];
}

/**
 * A demonstration of the catalogue as an act of a plan: what is planned at its typical amount, what
 * is credible at worst at the content of the container or the highest amount, volumes as they are at
 * the site.
 */
export function actFromDemonstration(
  demonstration: Demonstration,
  site: SiteState,
  gases: GasLibrary,
): DraftAct {
  const { temperatureK, pressurePa } = demonstration.referenceConditions;
  const scale = (pressurePa / temperatureK) * (site.temperatureK / site.pressurePa);
  return {
    title: demonstration.title,
    catalogueId: demonstration.id,
    releases: {
      planned: demonstration.releases.planned
        .filter(({ insteadOf }) => insteadOf === undefined)
        .map((release) => planRelease(release, amount(release, 'typical', scale))),
      worstCredible: demonstration.releases.worstCredible.map((release) =>
        planRelease(release, content(release, site, gases) ?? amount(release, 'high', scale)),
      ),
    },
    sound: demonstration.sound.map((heard) => {
      const { instrument, frequencyInAirHz, lengthM, radiusM, gas, composition } = heard;
      return {
        instrument,
        surroundings: heard.surroundings,
        ...(frequencyInAirHz !== undefined && { frequencyInAirHz }),
        ...(lengthM !== undefined && { lengthM }),
        ...(radiusM !== undefined && { radiusM }),
        ...(gas !== undefined && { gas }),
        ...(composition !== undefined && { composition }),
        ...(heard.volumeForEffectM3 !== undefined && {
          bagVolumeM3: settled(heard.volumeForEffectM3 * scale),
        }),
      };
    }),
  };
}
