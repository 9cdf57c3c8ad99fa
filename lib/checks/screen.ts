import type { CurveForm, HeightCurve } from '@/lib/schema/design';
import { LogDiameters } from '@/lib/stats/distributions/log-diameters';
import { HeightBand } from './band/height-band';
import { weakDiameters } from './band/weak-prior';
import { hypotheses } from './causes/hypotheses';
import { weighCauses } from './causes/weigh-causes';
import { rules } from './rules';
import type { RuleContext } from './rules/rule';
import type { BandReading, Doubt, ProjectUnits, Screen, StemEntry, Teaching } from './types';

export type ScreenOptions = {
  readonly units: ProjectUnits;
  readonly alarmRatePer100: number;
  readonly tauSquared: number;
  readonly curveForm: CurveForm;
  /** Published curves; the latest version of each group counts, '*' is all groups pooled. */
  readonly curves: readonly HeightCurve[];
};

/**
 * Of the alarm rate, the height takes nine tenths and the diameter one tenth, so that all that interrupts at one tree
 * stays within it (own choice: a height says more, and log-normal tails fit diameters only roughly).
 */
const HEIGHT_SHARE = 0.9;
/** A curve's diameters count as at most this many trees. */
const DIAMETERS_WORTH = 50;
const BISQUARE = 4.685;

type Taught = { readonly stem: StemEntry; readonly diameterWeight: number };

function latest(curves: readonly HeightCurve[], group: string): HeightCurve | undefined {
  return curves.filter((curve) => curve.curveGroup === group && !curve.deleted).reduce<HeightCurve | undefined>(
    (best, curve) => (!best || curve.version > best.version ? curve : best), undefined);
}

const NO_GROUP = '?';

/** Only a live, whole stem has a height that its diameter foretells. */
function hasExpectedHeight(stem: StemEntry): boolean {
  return stem.status === 'live' && stem.form === 'whole';
}

/**
 * The checks of one project, as they learn from its trees. Pure: no clock, no I/O; the same on phone and server.
 * An undoubted stem keeps the weight that it had when it was taught: for equal numbers elsewhere, teach in the same order.
 *
 * @returns a Screen; teach, forget, screen and band are O(1) in the number of trees
 * @example
 * const screen = createScreen({ units, alarmRatePer100: 1, tauSquared: 0.5, curveForm: 'curtis', curves });
 * screen.screen(stem); // doubts, the most telling first
 */
export function createScreen(options: ScreenOptions): Screen {
  const { units, curves } = options;
  const rate = options.alarmRatePer100 / 100;
  const bands = new Map<string, HeightBand>();
  const diameters = new Map<string, LogDiameters>();
  const taught = new Map<string, Taught>();
  const slips = hypotheses(units);

  const bandOf = (group: string): HeightBand => {
    let band = bands.get(group);
    if (!band) {
      band = new HeightBand({
        own: latest(curves, group), pooled: latest(curves, '*'), form: options.curveForm,
        breastHeightM: units.breastHeightM, tauSquared: options.tauSquared,
      });
      bands.set(group, band);
    }
    return band;
  };

  const diametersOf = (stem: StemEntry): LogDiameters => {
    // The group is part of the key: the prior comes from its curve, whichever stem of the species is seen first.
    const key = `${stem.curveGroup ?? NO_GROUP} ${stem.speciesId ?? NO_GROUP}`;
    let known = diameters.get(key);
    if (!known) {
      const curve = latest(curves, stem.curveGroup ?? '*') ?? latest(curves, '*');
      known = new LogDiameters(curve && curve.logDSd > 0
        ? { mean: curve.logDMean, sd: curve.logDSd, worthTrees: Math.min(DIAMETERS_WORTH, curve.n) }
        : weakDiameters);
      diameters.set(key, known);
    }
    return known;
  };

  const contextOf = (stem: StemEntry): RuleContext => {
    const band = bandOf(stem.curveGroup ?? NO_GROUP);
    const logDiameter = diametersOf(stem).predict();
    const expected = hasExpectedHeight(stem);
    const height = expected && stem.heightMethod !== 'estimated' ? stem.heightM : null;
    const causes = stem.dbhCm !== null && stem.dbhCm > 0 && (height === null || height > 0)
      ? weighCauses({ dCm: stem.dbhCm, hM: height }, {
        breastHeightM: units.breastHeightM, logDiameter, height: (dCm) => band.predictAnywhere(stem.plotId, dCm),
      }, slips)
      : null;
    return { units, heightRate: HEIGHT_SHARE * rate, diameterRate: (1 - HEIGHT_SHARE) * rate, band: expected ? band : null, logDiameter, causes };
  };

  const forget = (stemId: string): void => {
    const known = taught.get(stemId);
    if (!known) return;
    taught.delete(stemId);
    bandOf(known.stem.curveGroup ?? NO_GROUP).forget(stemId);
    if (known.diameterWeight > 0) diametersOf(known.stem).remove(known.stem.dbhCm!, known.diameterWeight);
  };

  const teachWeighted = (stem: StemEntry, heightWeight: number, diameterWeight: number): void => {
    if (heightWeight > 0 && stem.heightM !== null && stem.dbhCm !== null) {
      bandOf(stem.curveGroup ?? NO_GROUP).teach(stem.id, { plotId: stem.plotId, dCm: stem.dbhCm, hM: stem.heightM, weight: heightWeight });
    }
    if (diameterWeight > 0) diametersOf(stem).add(stem.dbhCm!, diameterWeight);
    taught.set(stem.id, { stem, diameterWeight });
  };

  const teach = (stem: StemEntry, teaching: Teaching): void => {
    forget(stem.id);
    if (teaching === 'none' || teaching === 'open' || stem.dbhCm === null || !(stem.dbhCm > 0)) return;
    const heightTeaches = hasExpectedHeight(stem) && stem.heightMethod !== 'estimated' && stem.heightM !== null && stem.heightM > units.breastHeightM;
    const correct = contextOf(stem).causes?.asTyped ?? 0;
    switch (teaching) {
      case 'undoubted':
        return teachWeighted(stem, heightTeaches ? correct : 0, correct);
      case 'measured-twice':
        return teachWeighted(stem, heightTeaches ? 1 : 0, 1);
      case 'accepted': {
        const u = heightTeaches ? bandOf(stem.curveGroup ?? NO_GROUP).residual(stem.plotId, stem.dbhCm, stem.heightM!) : null;
        const weight = u === null || Math.abs(u) >= BISQUARE ? 0 : (1 - (u / BISQUARE) ** 2) ** 2;
        return teachWeighted(stem, weight, correct);
      }
    }
  };

  /** Runs `work` as if this stem had taught nothing. */
  const without = <T>(stemId: string, work: () => T): T => {
    const known = taught.get(stemId);
    if (!known) return work();
    const band = bandOf(known.stem.curveGroup ?? NO_GROUP);
    const spread = known.diameterWeight > 0 ? diametersOf(known.stem) : null;
    spread?.remove(known.stem.dbhCm!, known.diameterWeight);
    try {
      return band.without(stemId, work);
    } finally {
      spread?.add(known.stem.dbhCm!, known.diameterWeight);
    }
  };

  return {
    units,
    teach,
    forget,
    screen: (stem): readonly Doubt[] => without(stem.id, () => {
      const context = contextOf(stem);
      const doubts = rules.flatMap((rule) => rule.check(stem, context) ?? []);
      const looks = doubts.filter(({ level }) => level === 'look');
      // At most one question at a tree: the first of the list; what else is odd is marked quietly.
      return [...looks.slice(0, 1), ...looks.slice(1).map((doubt) => ({ ...doubt, level: 'quiet' as const })), ...doubts.filter(({ level }) => level === 'quiet')];
    }),
    band: (stem, level): BandReading => without(stem.id, () => {
      if (!hasExpectedHeight(stem)) return { kind: 'none', reason: 'no-height-expected' };
      if (stem.dbhCm === null || !(stem.dbhCm > 0)) return { kind: 'none', reason: 'no-diameter' };
      const band = bandOf(stem.curveGroup ?? NO_GROUP);
      const interval = band.interval(stem.plotId, stem.dbhCm, level);
      return interval ? { kind: 'band', ...interval, level, source: band.source } : { kind: 'none', reason: 'outside-diameters' };
    }),
  };
}
