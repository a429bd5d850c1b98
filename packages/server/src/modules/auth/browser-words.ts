const browsers: readonly (readonly [RegExp, string])[] = [
  [/\bEdgA?\//u, 'Edge'],
  [/\bOPR\//u, 'Opera'],
  [/\bFirefox\//u, 'Firefox'],
  [/\b(?:Headless)?Chrom(?:e|ium)\//u, 'Chromium'],
  [/\bSafari\//u, 'Safari'],
];
const systems: readonly (readonly [RegExp, string])[] = [
  [/\bAndroid\b/u, 'Android'],
  [/\b(?:iPhone|iPad)\b/u, 'iOS'],
  [/\bWindows\b/u, 'Windows'],
  [/\bMac OS X\b/u, 'macOS'],
  [/\bLinux\b/u, 'Linux'],
];

/** "Firefox on Linux", from what the browser calls itself; for the owner's list of sessions. */
export function browserInWords(agent: string): string {
  const browser = browsers.find(([pattern]) => pattern.test(agent))?.[1] ?? 'An unknown program';
  const system = systems.find(([pattern]) => pattern.test(agent))?.[1];
  return system === undefined ? browser : `${browser} on ${system}`;
}
