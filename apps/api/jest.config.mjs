const swc = (parser) => [
  '@swc/jest',
  {
    swcrc: false,
    jsc: {
      target: 'es2022',
      keepClassNames: true,
      parser,
      transform: { legacyDecorator: true, decoratorMetadata: true, useDefineForClassFields: false },
    },
    module: { type: 'commonjs', ignoreDynamic: false },
    sourceMaps: 'inline',
  },
];

// Jest can't `require` ES modules on Node 20: packages that ship nothing else are transformed like our own files.
export default {
  testEnvironment: 'node',
  roots: ['<rootDir>/test'],
  testMatch: ['**/*.spec.ts'],
  testTimeout: 30_000,
  maxWorkers: 1,
  moduleNameMapper: { '^(\\.{1,2}/.*)\\.js$': ['$1.ts', '$1.js', '$1'] },
  testEnvironmentOptions: { customExportConditions: ['heddle-src', 'node', 'require', 'default'] },
  transform: {
    '^.+\\.ts$': swc({ syntax: 'typescript', decorators: true }),
    '^.+\\.m?js$': swc({ syntax: 'ecmascript' }),
  },
  transformIgnorePatterns: [
    '/node_modules/(?!(@nestjs|bcryptjs|file-type|nodemailer|smtp-server|uint8array-extras|strtok3|token-types|@tokenizer|load-esm)/)',
  ],
};
