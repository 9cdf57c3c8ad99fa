'use client';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { Notice } from '@/components/ui/notice';
import type { Project } from '@/lib/schema/project';
import { ApiError, sendApi } from '../_hooks/use-api';

type Species = { readonly id: string; readonly code: string; readonly localName: string };
type Fields = { file: FileList; dbhUnit: string; lengthUnit: string; dbh: string; height: string; species: string; defaultSpecies: string; plot: string; note: string };
type Props = { readonly base: string; readonly project: Project; readonly species: readonly Species[]; readonly changed: (words: string) => Promise<void> };

const look = 'min-h-10 w-full rounded border-2 border-ink-faint bg-paper-raised px-2 text-ink';

/** The first column of a header whose name looks like the wanted one. */
export function guessColumn(header: readonly string[], wanted: RegExp): string {
  return header.find((name) => wanted.test(name)) ?? '';
}

async function headerOf(file: File): Promise<readonly string[]> {
  const [first = ''] = (await file.slice(0, 4096).text()).replace(/^\uFEFF/, '').split(/\r?\n/);
  const delimiter = [';', '\t', ','].find((sign) => first.includes(sign)) ?? ',';
  return first.split(delimiter).map((name) => name.trim().replace(/^"|"$/g, '')).filter(Boolean);
}

/** Upload of reference trees: units are stated, columns chosen, and nothing is taken unless every row is sound. */
export function ImportForm({ base, project, species, changed }: Props) {
  const [header, setHeader] = useState<readonly string[]>([]);
  const [failure, setFailure] = useState<ApiError | Error | null>(null);
  const { register, handleSubmit, setValue, reset, formState: { isSubmitting } } = useForm<Fields>({ defaultValues: { dbhUnit: '', lengthUnit: '', dbh: '', height: '', species: '', defaultSpecies: '', plot: '', note: '' } });
  const file = register('file', {
    required: true,
    onChange: async (event: { target: { files: FileList | null } }) => {
      const chosen = event.target.files?.[0];
      const names = chosen ? await headerOf(chosen) : [];
      setHeader(names);
      setValue('dbh', guessColumn(names, /^(dbh|d|diam|girth)/i));
      setValue('height', guessColumn(names, /^(h|ht|height)/i));
      setValue('species', guessColumn(names, /^sp/i));
      setValue('plot', guessColumn(names, /^plot/i));
    },
  });
  const send = handleSubmit(async ({ file: files, ...fields }) => {
    setFailure(null);
    const form = new FormData();
    for (const [name, value] of Object.entries(fields)) form.set(name, value);
    form.set('file', files[0]!);
    try {
      const { rows } = await sendApi<{ rows: number }>(`${base}/imports`, form);
      reset();
      setHeader([]);
      await changed(`Took ${rows} trees. Look at the fit, then publish it.`);
    } catch (error) {
      setFailure(error instanceof Error ? error : new Error(String(error)));
    }
  });
  const column = (name: 'dbh' | 'height' | 'species' | 'plot', label: string, required: boolean) => (
    <div>
      <label htmlFor={`import-${name}`} className="block text-sm font-bold">{label}</label>
      <select id={`import-${name}`} className={look} {...register(name, { required })}>
        <option value="">{required ? 'Choose a column' : 'None'}</option>
        {header.map((title) => <option key={title} value={title}>{title}</option>)}
      </select>
    </div>
  );
  const unit = (name: 'dbhUnit' | 'lengthUnit', label: string, options: readonly string[]) => (
    <div>
      <label htmlFor={`import-${name}`} className="block text-sm font-bold">{label}</label>
      <select id={`import-${name}`} className={look} {...register(name, { required: true })}>
        <option value="">State it</option>
        {options.map((option) => <option key={option} value={option}>{option}</option>)}
      </select>
    </div>
  );
  return (
    <form onSubmit={(event) => void send(event)} className="space-y-3" aria-label="Bring reference trees">
      <div>
        <label htmlFor="import-file" className="block text-sm font-bold">CSV file, one tree a line, with a header</label>
        <input id="import-file" type="file" accept=".csv,.txt,.tsv,text/csv" className={`${look} py-1.5`} {...file} />
      </div>
      <div className="grid grid-cols-2 gap-3">
        {unit('dbhUnit', `DBH in the file is in`, ['cm', 'in'])}
        {unit('lengthUnit', 'Height in the file is in', ['m', 'ft'])}
        {column('dbh', 'Column of DBH', true)}
        {column('height', 'Column of height', true)}
        {column('species', 'Column of species', false)}
        {column('plot', 'Column of plot', false)}
        <div className="col-span-2">
          <label htmlFor="import-defaultSpecies" className="block text-sm font-bold">Or one species for all</label>
          <select id="import-defaultSpecies" className={look} {...register('defaultSpecies')}>
            <option value="">From the column</option>
            {species.map(({ id, code, localName }) => <option key={id} value={code}>{localName}</option>)}
          </select>
        </div>
        <div className="col-span-2">
          <label htmlFor="import-note" className="block text-sm font-bold">Source</label>
          <input id="import-note" className={look} maxLength={1000} {...register('note')} />
        </div>
      </div>
      <p className="text-sm text-ink-soft">This project measures DBH in {project.dbhUnit} and heights in {project.lengthUnit}. A file in other units is refused; nothing is converted.</p>
      {failure && (
        <Notice tone="halt" icon="hazard" live="alert" title={failure.message}>
          {failure instanceof ApiError && failure.issues.length > 0 && <ul className="list-disc pl-5">{failure.issues.slice(0, 20).map(({ field, message }) => <li key={`${field} ${message}`}><b>{field}:</b> {message}</li>)}</ul>}
        </Notice>
      )}
      <button type="submit" disabled={isSubmitting} className="min-h-10 cursor-pointer rounded border-2 border-bronze-strong bg-bronze px-4 font-bold text-bronze-on disabled:opacity-60">{isSubmitting ? 'Reading …' : 'Take these trees'}</button>
    </form>
  );
}
