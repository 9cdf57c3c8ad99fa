import type { DemoSummary } from '@/seeders/demo-summary';

type Greeting = { readonly summary: DemoSummary; readonly port: number; readonly lan: readonly string[]; readonly dataFolder: string };

/** What the demo prints before it serves: sign-ins, projects, addresses. */
export function demoGreeting({ summary, port, lan, dataFolder }: Greeting): string {
  const lines: string[] = [''];
  if (summary.state === 'foreign') {
    lines.push(`The database in ${dataFolder} is not a demo; nothing was sown into it. Sign in with your own people,`, 'or set LAMMAS_DATA to an empty folder for a demo.');
  } else {
    lines.push(summary.state === 'sown' ? 'The demo is sown. Projects:' : 'The demo as you left it. Projects:');
    for (const { name, describes } of summary.projects) lines.push(`  ${name}: ${describes}`);
    lines.push('', summary.state === 'sown' ? 'Sign in as (for the demo only):' : 'Sign in as (passwords as first made):');
    const width = Math.max(...summary.people.map(({ email }) => email.length));
    const passwordWidth = Math.max(...summary.people.map(({ password }) => password.length));
    for (const { email, password, name, does } of summary.people) lines.push(`  ${email.padEnd(width)}  ${password.padEnd(passwordWidth)}  ${name}, ${does}`);
  }
  lines.push('', `  office  http://localhost:${port}/office`, `  field   http://localhost:${port}/field`);
  if (lan.length > 0) {
    lines.push('', 'From a phone on the same network:', ...lan.map((address) => `  http://${address}:${port}/field`));
    lines.push('  Over plain http a phone can look round and work online. To install the app and work offline a browser wants https:', '  put a reverse proxy with a certificate in front and set NEXTAUTH_URL to its address.');
  }
  lines.push('', `Data are kept in ${dataFolder}. Stop with Ctrl+C.`, '');
  return lines.join('\n');
}
