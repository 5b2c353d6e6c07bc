import presets from 'jest-preset-angular/presets/index.js';

const node = (name, roots) => ({
  displayName: name,
  testEnvironment: 'node',
  roots,
  testMatch: ['**/*.spec.ts'],
  extensionsToTreatAsEsm: ['.ts'],
  transform: {
    '^.+\\.ts$': [
      '@swc/jest',
      {
        jsc: {
          parser: { syntax: 'typescript' },
          target: 'es2022',
          experimental: { keepImportAttributes: true },
        },
        module: { type: 'es6' },
      },
    ],
  },
});

export default {
  // Specs of the server make a database of their own; a busy machine needs its time for that.
  testTimeout: 60_000,
  projects: [
    node('shared', ['<rootDir>/shared', '<rootDir>/test/reference']),
    { ...node('server', ['<rootDir>/server', '<rootDir>/scripts', '<rootDir>/test/server']) },
    {
      ...presets.createEsmPreset({ tsconfig: '<rootDir>/tsconfig.spec.json' }),
      displayName: 'web',
      roots: ['<rootDir>/src'],
      testMatch: ['**/*.spec.ts'],
      setupFilesAfterEnv: ['<rootDir>/test/web/setup.ts'],
    },
  ],
};
