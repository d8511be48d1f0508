/** The kind of device and program of a User-Agent header, in two or three words; the header's own beginning when neither shows. */
export function agentText(agent: string): string {
  if (agent === '') return 'Unknown program';
  const device = /iPhone|iPad|Android|Windows|Macintosh|Linux/.exec(agent)?.[0];
  const program = /Firefox|Edg|OPR|Chrome|Safari/.exec(agent)?.[0];
  if (device === undefined && program === undefined) return agent.slice(0, 40);
  return `Browser on ${device?.replace('Macintosh', 'Mac') ?? 'an unknown device'}`;
}
