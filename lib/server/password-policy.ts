import 'server-only';
import { MOST_PASSWORD_BYTES, fitsBcrypt } from './password';

export const FEWEST_PASSWORD_CHARACTERS = 12;

/**
 * Long passwords that are tried first all the same, with letters and digits only, in lower case.
 * Source: common practice, from memory; sequences and repetitions are found by rule below.
 */
const COMMON: ReadonlySet<string> = new Set([
  'administrator', 'adminadminadmin', 'changemeplease', 'correcthorsebatterystaple', 'football1234', 'iloveyou1234', 'iloveyouforever',
  'letmeinplease', 'letmeinletmein', 'mypassword123', 'p4ssw0rdp4ssw0rd', 'passw0rd1234', 'passwordpassword', 'password1234', 'password12345',
  'password123456', 'qwertyuiop123', 'qwertyuiopasdfghjkl', 'trustno1trustno1', 'unitedstates', 'welcome12345', 'welcomewelcome', 'zaq12wsxcde3',
  '1q2w3e4r5t6y', '1qaz2wsx3edc', 'forestforest', 'lammaslammas', 'treestreestrees',
]);
const ROWS = ['0123456789012345678901234567890', 'abcdefghijklmnopqrstuvwxyz', 'qwertyuiopasdfghjklzxcvbnm', 'qwertzuiopasdfghjklyxcvbnm', '9876543210987654321'];

function isRepeated(text: string): boolean {
  // A word of up to four characters written over and over: "abcabcabcabc".
  return /^(.{1,4})\1+$/.test(text);
}

/**
 * What speaks against a new password, in words; empty when nothing does. At least 12 characters, at most 72 bytes,
 * not among the common ones, no run of the keyboard, not made of the person's own e-mail address.
 */
export function passwordFaults(password: string, email: string): string[] {
  const faults: string[] = [];
  if ([...password].length < FEWEST_PASSWORD_CHARACTERS) faults.push(`The password needs at least ${FEWEST_PASSWORD_CHARACTERS} characters.`);
  if (!fitsBcrypt(password)) faults.push(`The password may have at most ${MOST_PASSWORD_BYTES} bytes; letters with accents count two or more.`);
  const plain = password.toLowerCase().replace(/[^\p{L}\p{N}]/gu, '');
  const name = (email.toLowerCase().split('@')[0] ?? '').replace(/[^\p{L}\p{N}]/gu, '');
  if (COMMON.has(plain) || isRepeated(password.toLowerCase()) || (plain.length > 0 && ROWS.some((row) => row.includes(plain)))) {
    faults.push('The password is one of those that are tried first; choose another.');
  } else if (name.length >= 4 && plain.replaceAll(name, '').length < 6) {
    faults.push('The password is little more than the e-mail address; choose another.');
  }
  return faults;
}
