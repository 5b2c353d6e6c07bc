/** Of the browser's Trusted Types, which the page's policy demands for a worker's address. */
interface TrustedTypes {
  createPolicy(
    name: string,
    rules: { createScriptURL: (address: string) => string },
  ): { createScriptURL: (address: string) => string };
}

let policy: ReturnType<TrustedTypes['createPolicy']> | undefined;

function trusted(address: string): string {
  const { trustedTypes } = globalThis as { trustedTypes?: TrustedTypes };
  if (trustedTypes === undefined) return address;
  policy ??= trustedTypes.createPolicy('centrode', {
    createScriptURL: (wanted) => {
      if (new URL(wanted).origin !== location.origin) throw new TypeError('A foreign worker');
      return wanted;
    },
  });
  return policy.createScriptURL(address);
}

/** Opens the engine's worker; its script is fetched when the first answer is asked for. */
export function startEngineWorker(): Worker {
  // The builder finds a worker by the words `new Worker(new URL(...))`; this class lets them stand
  // while the address goes through the policy.
  const Worker = class extends globalThis.Worker {
    constructor(address: URL, options: WorkerOptions) {
      super(trusted(address.href), options);
    }
  };
  return new Worker(new URL('../../../engine.worker', import.meta.url), {
    type: 'module',
    name: 'engine',
  });
}
