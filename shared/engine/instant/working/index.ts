import type { Working } from './working';
export const workInstant = (): Working => ({ steps: [] });
