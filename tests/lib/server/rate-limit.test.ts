import { randomUUID } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { MINUTE, forgetTurns, signInPerAccount, syncPerDevice, takeTurn } from '@/lib/server/rate-limit';
import { clientAddress } from '@/lib/server/rate-limit-address';

const START = 1_000 * MINUTE;
const use = (key: string, times: number, at: number) => Array.from({ length: times }, () => takeTurn(key, signInPerAccount, at)).map(({ allowed }) => allowed);

describe('the limit of attempts', () => {
  it('lets five through and stops the sixth, for a minute', () => {
    const key = randomUUID();
    expect(use(key, 5, START)).toEqual([true, true, true, true, true]);
    expect(takeTurn(key, signInPerAccount, START)).toEqual({ allowed: false, retryAfterSeconds: 60 });
    expect(takeTurn(key, signInPerAccount, START + MINUTE - 1).allowed).toBe(false);
    expect(takeTurn(key, signInPerAccount, START + MINUTE).allowed).toBe(true);
  });
  it('lets five in any minute through when they are spread', () => {
    const key = randomUUID();
    expect(Array.from({ length: 20 }, (_, i) => takeTurn(key, signInPerAccount, START + i * 13_000).allowed)).not.toContain(false);
  });
  it('makes each further stop twice as long, up to a quarter of an hour', () => {
    const key = randomUUID();
    let at = START;
    const waits: number[] = [];
    for (let i = 0; i < 6; i += 1) {
      use(key, 5, at);
      const answer = takeTurn(key, signInPerAccount, at);
      if (answer.allowed) throw new Error('not stopped');
      waits.push(answer.retryAfterSeconds);
      at += answer.retryAfterSeconds * 1000;
    }
    expect(waits).toEqual([60, 120, 240, 480, 900, 900]);
  });
  it('counts each key by itself, and forgets one on demand', () => {
    const [one, other] = [randomUUID(), randomUUID()];
    use(one, 6, START);
    expect(takeTurn(other, signInPerAccount, START).allowed).toBe(true);
    forgetTurns(one);
    expect(takeTurn(one, signInPerAccount, START).allowed).toBe(true);
  });
  it('lets a device sync 120 times a minute', () => {
    const key = randomUUID();
    const answers = Array.from({ length: 121 }, () => takeTurn(key, syncPerDevice, START).allowed);
    expect(answers.filter(Boolean)).toHaveLength(120);
    expect(answers.at(-1)).toBe(false);
  });
});

describe('the address of the other side', () => {
  it.each([
    ['without a proxy a forwarded address is not believed', '203.0.113.9', '10.0.0.1', [], '203.0.113.9'],
    ['behind a proxy it is the last address that the proxy added', '10.0.0.2', '198.51.100.7, 203.0.113.9', ['10.0.0.2'], '203.0.113.9'],
    ['behind two proxies both are skipped', '10.0.0.2', '203.0.113.9, 10.0.0.3', ['10.0.0.2', '10.0.0.3'], '203.0.113.9'],
    ['IPv4 in IPv6 dress is the same address', '::ffff:10.0.0.2', '203.0.113.9', ['10.0.0.2'], '203.0.113.9'],
    ['a proxy that says nothing is itself the address', '10.0.0.2', undefined, ['10.0.0.2'], '10.0.0.2'],
  ])('%s', (_, socket, forwarded, proxies, expected) => {
    expect(clientAddress(socket, forwarded, proxies)).toBe(expected);
  });
});
