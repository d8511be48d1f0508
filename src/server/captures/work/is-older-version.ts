/** Whether version `a` ("1.4.0") comes before `b`. What is not a version counts as older. */
export function isOlderVersion(a: string, b: string): boolean {
  const left = parts(a);
  const right = parts(b);
  for (let k = 0; k < 3; k += 1) {
    const difference = (left[k] ?? 0) - (right[k] ?? 0);
    if (difference !== 0) return difference < 0;
  }
  return false;
}

const parts = (version: string) => version.split('.').map((part) => Number.parseInt(part, 10) || 0);
