import { describe, expect, it } from 'vitest';
import { bandPlace, bandVerdict } from '@/components/charts/band-strip';
import { reachedFiles, scriptHashes } from '@/lib/cli/after-build';
import { doubtSentence } from '@/app/(field)/field/_entry/doubt-words';
import { readAsWords } from '@/app/(field)/field/_entry/read-as';
import { teachingOf } from '@/app/(field)/field/_entry/stem-entry';
import { decimalSign } from '@/app/(field)/field/_data/decimal-sign';
import { parentOf, parsePath, pathOf } from '@/app/(field)/field/_shell/router';
import { causeSchema } from '@/lib/schema/field';
import type { SecondLook } from '@/lib/schema/field';

describe('addresses', () => {
  it.each(['/field', '/field/projects', '/field/p/1', '/field/p/1/sync', '/field/p/1/plot/2', '/field/p/1/plot/2/visit/3', '/field/p/1/plot/2/visit/3/finish'])('%s is read and written the same', (path) => {
    expect(pathOf(parsePath(path))).toBe(path);
  });

  it.each(['/office', '/field/x', '/field/p', '/field/p/1/plot', '/field/p/1/plot/2/visit', '/field/p/1/plot/2/visit/3/finish/4', '/field/p/1/sync/2'])('%s is none of the field', (path) => {
    expect(parsePath(path).name).toBe('unknown');
  });

  it('back goes one level up', () => {
    expect(pathOf(parentOf(parsePath('/field/p/1/plot/2/visit/3')))).toBe('/field/p/1/plot/2');
    expect(pathOf(parentOf(parsePath('/field/p/1/plot/2')))).toBe('/field/p/1');
  });
});

describe('the step after the build', () => {
  it('hashes inline scripts as a policy names them, each once, and leaves others out', () => {
    // The value for alert('Hello, world.'); is the worked example of the Content Security Policy recommendation (W3C, from memory).
    const html = "<script src=\"/a.js\"></script><script>alert('Hello, world.');</script><script nomodule>alert('Hello, world.');</script><script></script>";
    expect(scriptHashes(html)).toEqual(['sha256-qznLcsROx4GACP2dm0UCKCzCG+HiZ1guq6ZZDob/Tng=']);
  });

  it('keeps what the page names and what that names in turn, and nothing else', async () => {
    const files: Record<string, string> = {
      'chunks/a1.js': 'import("static/chunks/b2.js")', 'chunks/b2.js': '', 'chunks/office.js': 'chunks/a1.js', 'chunks/s3.css': 'url(../media/f4.woff2)', 'media/f4.woff2': '', 'media/g5.woff2': '',
    };
    const reached = await reachedFiles('<script src="/_next/static/chunks/a1.js"></script><link href="/_next/static/chunks/s3.css">', Object.keys(files), (name) => Promise.resolve(files[name]!));
    expect([...reached].sort((a, b) => (a < b ? -1 : 1))).toEqual(['chunks/a1.js', 'chunks/b2.js', 'chunks/s3.css', 'media/f4.woff2']);
  });
});

describe('words', () => {
  const look = { quantity: 'height', cause: null, enteredDigits: '78', enteredCanonical: 78, expectedLow: 19, expectedHigh: 29 } as const;
  const metric = { dbhUnit: 'cm', lengthUnit: 'm' } as const;

  it('a doubt is one short sentence that names no expected number', () => {
    for (const cause of [...causeSchema.options, null]) {
      for (const quantity of ['dbh', 'height'] as const) {
        const sentence = doubtSentence({ ...look, quantity, cause }, metric);
        expect(sentence.match(/[.!?]/g)).toHaveLength(1);
        expect(sentence.split(' ').length).toBeLessThanOrEqual(10);
        expect(sentence).not.toMatch(/19|29/);
      }
    }
  });

  it('names the unit it may have been, by the units of the project', () => {
    expect(doubtSentence({ ...look, cause: 'height-other-unit' }, metric)).toBe('Height 78 looks like feet, not metres.');
    expect(doubtSentence({ ...look, enteredDigits: '24', cause: 'height-other-unit' }, { dbhUnit: 'in', lengthUnit: 'ft' })).toBe('Height 24 looks like metres, not feet.');
  });

  it('says short and tall by the side on which the value lies', () => {
    expect(doubtSentence(look, metric)).toBe('Height 78 is tall for this tree.');
    expect(doubtSentence({ ...look, enteredDigits: '4', enteredCanonical: 4 }, metric)).toBe('Height 4 is short for this tree.');
  });

  it('says what digits will be read as', () => {
    expect(readAsWords('12,5', 'dbh', metric)).toBe('read as 12.5 cm');
    expect(readAsWords('243', 'dbh', metric)).toBe('read as 243 cm');
    expect(readAsWords('12,', 'dbh', metric)).toBeNull();
  });

  it('shows the decimal sign of the language', () => {
    expect([decimalSign('de'), decimalSign('en')]).toEqual([',', '.']);
  });
});

describe('the band strip', () => {
  it('says in words on which side a value stands, and how far', () => {
    expect([5, 15, 20, 35, 80].map((value) => bandVerdict(20, 30, value))).toEqual([
      'far below the expected band', 'below the expected band', 'inside the expected band', 'above the expected band', 'far above the expected band',
    ]);
  });

  it('a value beyond the strip stops at its edge', () => {
    expect(bandPlace(20, 30, 25).beyond).toBe(0);
    expect([bandPlace(20, 30, -500).beyond, bandPlace(20, 30, 500).beyond]).toEqual([-1, 1]);
  });
});

describe('how much a stem teaches', () => {
  const answered = (answer: SecondLook['answer'], level: SecondLook['level'] = 'look', answerReadingId: string | null = 'r') => ({ answer, level, answerReadingId, deleted: false }) as SecondLook;
  it.each([
    ['undoubted', []], ['undoubted', [answered('converted')]], ['undoubted', [answered('withdrawn')]], ['undoubted', [answered('open', 'quiet')]],
    ['open', [answered('accepted'), answered('open')]], ['accepted', [answered('accepted')]], ['measured-twice', [answered('measured-again')]], ['measured-twice', [answered('read-again')]],
  ] as const)('%s', (teaching, looks) => {
    expect(teachingOf(looks)).toBe(teaching);
  });
});
