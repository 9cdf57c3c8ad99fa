import { describe, expect, it } from 'vitest';
import { fitsBcrypt, hashPassword, verifyPassword } from '@/lib/server/password';
import { passwordFaults } from '@/lib/server/password-policy';

describe('passwords', () => {
  // bcrypt test vectors of the OpenBSD family, as published with John the Ripper and Openwall crypt_blowfish.
  it.each([
    ['U*U', '$2a$05$CCCCCCCCCCCCCCCCCCCCC.E5YPO9kmyuRGyh0XouQYb4YMJKvyOeW'],
    ['U*U*', '$2a$05$CCCCCCCCCCCCCCCCCCCCC.VGOzA784oUp/Z0DY336zx7pLYAy0lwK'],
    ['U*U*U', '$2a$05$XXXXXXXXXXXXXXXXXXXXXOAcXxm9kjPGEMsLznoKqmqw7tc8WCx4a'],
  ])('%s is verified against a published hash', async (password, hash) => {
    expect(await verifyPassword(password, hash)).toBe(true);
    expect(await verifyPassword(`${password}x`, hash)).toBe(false);
  });
  it('a hash is verified by its password only, and never twice the same', async () => {
    const [one, two] = await Promise.all([hashPassword('moss on the north side'), hashPassword('moss on the north side')]);
    expect(one).not.toBe(two);
    expect(await Promise.all([verifyPassword('moss on the north side', one), verifyPassword('Moss on the north side', one)])).toEqual([true, false]);
  });
  it('no hash means no, even for the stand-in that takes the time', async () => {
    expect(await verifyPassword('', null)).toBe(false);
  });
  it('hashing leaves the event loop free', async () => {
    let longest = 0;
    let last = performance.now();
    const timer = setInterval(() => { longest = Math.max(longest, performance.now() - last); last = performance.now(); }, 5);
    await hashPassword('moss on the north side');
    clearInterval(timer);
    // Cost 12 takes 0.2 s and more of a core; on this thread it would show as one pause of that length.
    expect(longest).toBeLessThan(150);
  });
  it('72 bytes fit, 73 do not, and are refused rather than cut', async () => {
    expect([fitsBcrypt('a'.repeat(72)), fitsBcrypt('a'.repeat(73)), fitsBcrypt('é'.repeat(36)), fitsBcrypt('é'.repeat(37))]).toEqual([true, false, true, false]);
    await expect(hashPassword('a'.repeat(73))).rejects.toThrow(/72 bytes/);
    const hash = await hashPassword('b'.repeat(72));
    expect(await verifyPassword('b'.repeat(73), hash)).toBe(false);
  });
});

describe('a new password', () => {
  it.each(['moss on the north side', 'a'.repeat(30) + 'mossy stone wall!', 'Ünter den Buchen 7', 'x7#kQ9!vT2&p'])('%s is taken', (password) => {
    expect(passwordFaults(password, 'ingrid@lammas.test')).toEqual([]);
  });
  it.each(['elevenchars', 'Password1234', 'pass-word-1234', '123456789012', 'abcabcabcabc', 'qwertyuiopas', 'a'.repeat(73), 'ingrid.vale1'])('%s is refused', (password) => {
    expect(passwordFaults(password, 'ingrid.vale@lammas.test')).not.toEqual([]);
  });
});
