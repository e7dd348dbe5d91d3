import { config } from '@/lib/config';
import type { Origin } from './commands';

const browsers: [RegExp, string][] = [[/Edg\//, 'Edge'], [/OPR\//, 'Opera'], [/Firefox\//, 'Firefox'], [/Chrom(e|ium)\//, 'Chrome'], [/Safari\//, 'Safari']];
const systems: [RegExp, string][] = [[/Android/, 'Android'], [/iPad/, 'iPad'], [/iPhone/, 'iPhone'], [/Windows/, 'Windows'], [/Mac OS X/, 'macOS'], [/CrOS/, 'ChromeOS'], [/Linux/, 'Linux']];
const firstOf = (list: [RegExp, string][], text: string, other: string): string => list.find(([pattern]) => pattern.test(text))?.[1] ?? other;

/** "Firefox on Windows": enough for a person to know a device again. */
export const deviceName = (userAgent: string): string => `${firstOf(browsers, userAgent, 'A browser')} on ${firstOf(systems, userAgent, 'another system')}`;

/**
 * Where a request comes from. Behind a proxy of ours the last entry of X-Forwarded-For is what that proxy saw. Without one the server
 * itself fills the header in, but keeps one that a client sent: then the address can be feigned, and the delay of the account alone holds.
 */
export function originOf(header: (name: string) => string | null | undefined): Origin {
  const forwarded = (header('x-forwarded-for') ?? '').split(',').map((part) => part.trim()).filter(Boolean);
  const address = (config().trustedProxy ? forwarded.at(-1) : forwarded[0]) ?? 'unknown';
  return { address: address.slice(0, 60), device: deviceName(header('user-agent') ?? '') };
}
