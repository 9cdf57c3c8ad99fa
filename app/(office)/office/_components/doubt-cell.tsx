'use client';
import { DoubtTag } from '@/components/ui/doubt-tag';
import type { Answer, Cause } from '@/lib/schema/field';
import { answerWords, causeWords, ruleWords } from '@/lib/schema/words';

type Row = Readonly<Record<string, string | number | null>>;
const parts = (value: string | number | null | undefined) => (typeof value === 'string' ? value.split('|') : []);

/** Each second look of a stem with what became of it. */
export function DoubtCell({ row }: { readonly row: Row }) {
  const [rules, causes, suggested, answers, reasons] = [row.rules, row.causes, row.suggested, row.answers, row.reasons].map(parts);
  const quiet = Number(row.quiet_marks ?? 0);
  return (
    <ul className="space-y-1">
      {rules!.map((rule, i) => {
        const answer = (answers![i] ?? 'open') as Answer;
        return (
          <li key={`${rule} ${i}`}>
            <DoubtTag answered={answer !== 'open'}>{ruleWords[rule] ?? rule}</DoubtTag>
            {causes![i] && <> likely {causeWords[causes![i] as Cause]}{suggested![i] && <>, suggested <span className="digits">{suggested![i]}</span></>}</>}
            <b> {answerWords[answer]}</b>{reasons![i] && `: ${reasons![i]}`}
          </li>
        );
      })}
      {quiet > 0 && <li className="text-ink-soft">{quiet} quiet mark{quiet === 1 ? '' : 's'}</li>}
      {Number(row.two_values ?? 0) > 0 && <li><DoubtTag>two values</DoubtTag></li>}
    </ul>
  );
}
