import { lookup as resolve } from 'node:dns';
import { BlockList, isIP, type LookupFunction } from 'node:net';

/** Addresses that lead into the house or nowhere (IANA special-purpose registries, RFC 6890). */
const INNER = new BlockList();
const SUBNETS: ReadonlyArray<readonly [string, number, 'ipv4' | 'ipv6']> = [
  ['0.0.0.0', 8, 'ipv4'],
  ['10.0.0.0', 8, 'ipv4'],
  ['100.64.0.0', 10, 'ipv4'],
  ['127.0.0.0', 8, 'ipv4'],
  ['169.254.0.0', 16, 'ipv4'],
  ['172.16.0.0', 12, 'ipv4'],
  ['192.0.0.0', 24, 'ipv4'],
  ['192.0.2.0', 24, 'ipv4'],
  ['192.168.0.0', 16, 'ipv4'],
  ['198.18.0.0', 15, 'ipv4'],
  ['198.51.100.0', 24, 'ipv4'],
  ['203.0.113.0', 24, 'ipv4'],
  ['224.0.0.0', 3, 'ipv4'],
  ['::', 127, 'ipv6'],
  ['64:ff9b::', 96, 'ipv6'],
  ['64:ff9b:1::', 48, 'ipv6'],
  ['100::', 64, 'ipv6'],
  ['2001::', 23, 'ipv6'],
  ['2001:db8::', 32, 'ipv6'],
  ['2002::', 16, 'ipv6'],
  ['fc00::', 7, 'ipv6'],
  ['fe80::', 10, 'ipv6'],
  ['ff00::', 8, 'ipv6'],
];
for (const [net, prefix, type] of SUBNETS) INNER.addSubnet(net, prefix, type);

/** Whether an IP address is one of the open Internet. An IPv4 address inside an IPv6 one counts as itself. */
export function isPublicAddress(address: string): boolean {
  const family = isIP(address);
  return family !== 0 && !INNER.check(address, family === 4 ? 'ipv4' : 'ipv6');
}

export class PrivateAddressError extends Error {
  override name = 'PrivateAddressError';
  constructor(host: string) {
    super(`${host} leads to an address inside this network.`);
  }
}

/**
 * A `lookup` for `http.request`: the address that was checked is the address
 * that is connected to, so that a name cannot point elsewhere in between.
 */
export const publicLookup: LookupFunction = (hostname, options, callback) => {
  resolve(hostname, { ...options, all: true }, (error, addresses) => {
    if (error) return callback(error, '');
    const inner = addresses.find(({ address }) => !isPublicAddress(address));
    const [first] = addresses;
    if (inner || !first) return callback(new PrivateAddressError(hostname), '');
    if (options.all) callback(null, addresses);
    else callback(null, first.address, first.family);
  });
};
