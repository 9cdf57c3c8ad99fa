'use client';
import { useState } from 'react';
import { Scatter } from '@/components/charts/scatter';
import { Notice } from '@/components/ui/notice';
import type { CurveForm } from '@/lib/schema/design';
import type { Project } from '@/lib/schema/project';
import type { PresentedGroup } from '@/lib/server/curves/present-curves';
import { fromCanonicalCm, fromCanonicalM } from '@/lib/trees/units';
import { sendApi } from '../_hooks/use-api';
import { Select } from './select';

const refusals = {
  'too-few': 'There are fewer than three trees.',
  'all-diameters-equal': 'All diameters are equal; a curve needs different ones.',
  'not-finite': 'A value is no number.',
  'height-not-above-breast-height': 'A height is not above breast height.',
  'no-spread': 'The heights lie exactly on a curve: they were computed, not measured.',
} as const;

type Props = { readonly base: string; readonly group: PresentedGroup; readonly project: Project; readonly changed: (words: string) => Promise<void> };

/** One curve group: its fit by the chosen form in numbers and two pictures, and the button that publishes it. */
export function CurveGroup({ base, group, project, changed }: Props) {
  const [form, setForm] = useState<CurveForm>(project.curveForm);
  const [busy, setBusy] = useState(false);
  const [wrong, setWrong] = useState<string | null>(null);
  const fit = group.fits[form];
  const name = group.curveGroup === '*' ? 'all groups' : group.curveGroup;
  const own = ({ dCm, hM }: { dCm: number; hM: number }) => ({ x: fromCanonicalCm(dCm, project.dbhUnit), y: fromCanonicalM(hM, project.lengthUnit) });
  const publish = async () => {
    setBusy(true);
    setWrong(null);
    try {
      await sendApi(`${base}/curves`, { curveGroup: group.curveGroup, form });
      await changed(`Published the ${form} curve of ${name}. Crews get it with their next work pack or camp sync.`);
    } catch (error) {
      setWrong(error instanceof Error ? error.message : String(error));
    } finally {
      setBusy(false);
    }
  };
  return (
    <section aria-label={`Curve of ${name}`} className="book-line pb-6">
      <div className="flex flex-wrap items-end gap-4 py-3">
        <h2 className="text-lg font-bold">{name} <span className="digits text-base font-normal text-ink-soft">{group.n} trees</span></h2>
        <Select label="Form" value={form} change={(value) => setForm(value as CurveForm)} options={[['curtis', 'Curtis'], ['michailoff', 'Michailoff'], ['wykoff', 'Wykoff'], ['power', 'Power']]} />
        <button type="button" disabled={busy || fit.kind !== 'fit'} onClick={() => void publish()} className="min-h-10 cursor-pointer rounded border-2 border-bronze-strong bg-bronze px-4 font-bold text-bronze-on disabled:cursor-default disabled:opacity-60">{busy ? 'Publishing …' : `Publish curve of ${name}`}</button>
      </div>
      {wrong && <Notice tone="halt" icon="hazard" live="alert">{wrong}</Notice>}
      {fit.kind === 'refused' ? <p className="text-ink-soft">{refusals[fit.reason]}</p> : (
        <>
          <p className="digits pb-3 text-sm">
            ln(h − {project.breastHeightM}) = {fit.b0.toFixed(4)} {fit.b1 < 0 ? '−' : '+'} {Math.abs(fit.b1).toFixed(4)}·x(d) · s {Math.sqrt(fit.residualVariance).toFixed(4)} · {fit.residualDf.toFixed(0)} df · {fit.plots === 0 ? 'no plots' : `${fit.plots} plots, τ² ${fit.tauSquared}`} · d in cm, h in m
          </p>
          <div className="grid gap-6 md:grid-cols-2">
            <Scatter title="Heights and curve" xLabel={`DBH, ${project.dbhUnit}`} yLabel={`height, ${project.lengthUnit}`} points={fit.points.map(own)} line={fit.line.map(own)} />
            <Scatter title="Residuals against fitted" xLabel="fitted ln(h − bh), m" yLabel="residual of ln(h − bh)" points={fit.points.map(({ fitted, residual }) => ({ x: fitted, y: residual }))} level={0} />
          </div>
        </>
      )}
    </section>
  );
}
