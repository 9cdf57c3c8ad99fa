import 'server-only';
import { randomUUID } from 'node:crypto';

// The header's name is drawn anew at each start, so no client can send it; see lib/cli/start.ts, which fills it in.
const shared = globalThis as typeof globalThis & { lammasAddressHeader?: string };

/** Name of the request header in which our own server notes the address of the other side. */
export function addressHeader(): string {
  return (shared.lammasAddressHeader ??= `x-lammas-address-${randomUUID()}`);
}

/**
 * The address a request came from. X-Forwarded-For is believed only from a configured proxy, and of it only what
 * such proxies added: read from the right, the first address that is not one of them.
 */
export function clientAddress(socketAddress: string | undefined, forwardedFor: string | undefined, trustedProxies: readonly string[]): string {
  const plain = (address: string) => address.trim().replace(/^::ffff:/, '');
  const direct = plain(socketAddress ?? 'unknown');
  if (!trustedProxies.includes(direct)) return direct;
  const hops = (forwardedFor ?? '').split(',').map(plain).filter(Boolean);
  return hops.reverse().find((hop) => !trustedProxies.includes(hop)) ?? direct;
}
