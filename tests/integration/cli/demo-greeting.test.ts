import { describe, expect, it } from 'vitest';
import { demoGreeting } from '@/lib/cli/demo/demo-greeting';
import { demoPeople } from '@/seeders/demo-people';

const projects = [{ id: 'p', name: 'Velmarrow estate', describes: 'metric' }];
const greet = (state: 'sown' | 'kept' | 'foreign', lan: readonly string[] = []) =>
  demoGreeting({ summary: state === 'foreign' ? { state } : { state, people: demoPeople, projects }, port: 3355, lan, dataFolder: '/data' });

describe('what the demo prints', () => {
  it.each(['sown', 'kept'] as const)('%s: every sign-in with its password, the projects, where the office and the field app are', (state) => {
    const text = greet(state);
    for (const { email, password } of demoPeople) expect(text).toMatch(new RegExp(`${email} +${password} `));
    for (const part of ['Velmarrow estate', 'http://localhost:3355/office', 'http://localhost:3355/field', '/data']) expect(text).toContain(part);
  });

  it('a database that is no demo: no demo sign-in is printed, since none exists', () => {
    const text = greet('foreign');
    for (const { password, email } of demoPeople) {
      expect(text).not.toContain(password);
      expect(text).not.toContain(email);
    }
  });

  it('addresses for a phone come with the note that installing wants https; without a network neither is there', () => {
    expect(greet('sown', ['192.168.1.20'])).toMatch(/http:\/\/192\.168\.1\.20:3355\/field[\s\S]*https/);
    expect(greet('sown')).not.toContain('phone');
  });

  it('demo passwords are at least 12 characters long and each person has another', () => {
    for (const { password } of demoPeople) expect(password.length).toBeGreaterThanOrEqual(12);
    expect(new Set(demoPeople.map(({ password }) => password)).size).toBe(demoPeople.length);
  });
});
