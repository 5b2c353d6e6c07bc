const steps = ['B', 'kB', 'MB', 'GB'];

/** A size in decimal units (IEC 80000-13: k is 1000), three digits; empty when it is not known. */
export function sizeText(bytes: number | null): string {
  if (bytes === null) return '';
  const step = Math.min(steps.length - 1, Math.floor(Math.log10(Math.max(1, bytes)) / 3));
  const value = bytes / 1000 ** step;
  return `${step === 0 ? value : Number(value.toPrecision(3))} ${steps[step] ?? ''}`;
}
