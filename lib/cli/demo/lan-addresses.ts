import os from 'node:os';

/** Addresses of this machine on the networks around it (IPv4, not loopback), for a phone on the same network. */
export function lanAddresses(interfaces: ReturnType<typeof os.networkInterfaces> = os.networkInterfaces()): string[] {
  const found = Object.values(interfaces).flatMap((entries) => entries ?? []).filter(({ family, internal, address }) =>
    // Link-local addresses (RFC 3927) lead nowhere.
    family === 'IPv4' && !internal && !address.startsWith('169.254.'));
  return [...new Set(found.map(({ address }) => address))];
}
