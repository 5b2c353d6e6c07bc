/** The same reading of a solution as on the screen. */
export * from '#shared/engine/documents/motion-quantities';
