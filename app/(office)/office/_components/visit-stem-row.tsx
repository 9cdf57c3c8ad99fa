'use client';
import { DoubtTag } from '@/components/ui/doubt-tag';
import type { Reading, SecondLook } from '@/lib/schema/field';
import type { Project } from '@/lib/schema/project';
import { answerWords, causeWords, formWords, reasonWords, ruleWords, statusWords } from '@/lib/schema/words';
import type { VisitStem } from '@/lib/server/projects/read-visit';
import { formatValue } from '@/lib/trees/format-value';
import { fromCanonicalCm, fromCanonicalM } from '@/lib/trees/units';
import { stemName } from './stem-name';
import { when } from './when';

const originWords: Readonly<Record<Reading['origin'], string>> = { first: 'first reading', again: 'measured again', retyped: 'read again, mended', converted: 'suggested value taken' };
const quantityWords = { dbh: 'DBH', height: 'Height' } as const;

function limits(look: SecondLook, project: Project | undefined): string | null {
  if (!project || look.expectedLow === null || look.expectedHigh === null) return null;
  const [unit, decimals, own] = look.quantity === 'dbh'
    ? [project.dbhUnit, project.dbhDecimals, (value: number) => fromCanonicalCm(value, project.dbhUnit)] as const
    : [project.lengthUnit, project.heightDecimals, (value: number) => fromCanonicalM(value, project.lengthUnit)] as const;
  return `${formatValue(own(look.expectedLow), decimals)} to ${formatValue(own(look.expectedHigh), decimals)} ${unit}`;
}

function Look({ look, project }: { readonly look: VisitStem['looks'][number]; readonly project: Project | undefined }) {
  const unit = project && (look.quantity === 'dbh' ? project.dbhUnit : project.lengthUnit);
  const expected = limits(look, project);
  if (look.level === 'quiet') return <li className="text-ink-soft">Quiet mark: {quantityWords[look.quantity]} {look.enteredDigits} {unit}, {ruleWords[look.rule] ?? look.rule}.</li>;
  return (
    <li>
      <DoubtTag answered={look.answer !== 'open'}>{ruleWords[look.rule] ?? look.rule}</DoubtTag>{' '}
      {quantityWords[look.quantity]} <span className="digits">{look.enteredDigits}</span> {unit}{expected && <>, expected <span className="digits">{expected}</span></>}
      {look.cause && <>; likely {causeWords[look.cause]} ({Math.round((look.causeProbability ?? 0) * 100)} %)</>}
      {look.suggestedDigits && <>, suggested {quantityWords[look.suggestedQuantity ?? look.quantity]} <span className="digits">{look.suggestedDigits}</span></>}.{' '}
      <b>{answerWords[look.answer]}</b>
      {look.reason && `: ${reasonWords[look.reason].toLowerCase()}`}{look.answerNote && ` (${look.answerNote})`}
      {look.answeredBy && `, ${look.answeredBy}`}{look.answeredAt && `, ${when(look.answeredAt)}`}.
    </li>
  );
}

/** One stem as it stands, what was read on the way, and what was doubted. */
export function VisitStemRow({ stem: { tag, stem, species, measurement, readings, looks, recheck }, project }: { readonly stem: VisitStem; readonly project: Project | undefined }) {
  const open = looks.some(({ level, answer }) => level === 'look' && answer === 'open');
  return (
    <li className="flex border-b border-paper-line">
      <span className={`w-2 shrink-0 ${open ? 'doubt-edge' : ''}`} aria-hidden="true" />
      <div className="grid flex-1 gap-x-6 gap-y-1 px-3 py-2 text-sm md:grid-cols-[14rem_1fr_1.4fr]">
        <div>
          <p className="text-base"><b>Tree {stemName(tag, stem)}</b> {species ?? 'no species'}</p>
          <p className="digits text-base">{measurement.dbhDigits === null ? 'no DBH' : `${measurement.dbhDigits} ${measurement.dbhUnit}`} · {measurement.heightDigits === null ? 'no height' : `${measurement.heightDigits} ${measurement.heightUnit}`}</p>
          <p className="text-ink-soft">{statusWords[measurement.status]}, {formWords[measurement.form].toLowerCase()}{measurement.remarks && `. ${measurement.remarks}`}</p>
        </div>
        <ul aria-label={`Readings of tree ${tag}`}>
          {readings.map((reading) => (
            <li key={reading.id}>
              {quantityWords[reading.quantity]} <span className="digits">{reading.digits}</span> {reading.unit}, {originWords[reading.origin]}
              <span className="text-ink-soft">; measured {reading.measurer ?? '–'}, recorded {reading.recorder ?? '–'}, {when(reading.takenAt)}</span>
            </li>
          ))}
        </ul>
        <ul aria-label={`Second looks at tree ${tag}`} className="space-y-1">
          {looks.map((look) => <Look key={look.id} look={look} project={project} />)}
          {recheck.state === 'differs' && <li className="text-ink-soft">The server’s own check {recheck.rules.length === 0 ? 'asks nothing here' : `asks: ${recheck.rules.map((rule) => ruleWords[rule] ?? rule).join('; ')}`}.</li>}
        </ul>
      </div>
    </li>
  );
}
