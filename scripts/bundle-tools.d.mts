export function bundleTools(outDir: string): Promise<void>;
