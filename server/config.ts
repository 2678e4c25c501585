import { z } from 'zod';

const flag = z
  .enum(['0', '1', 'true', 'false'])
  .default('0')
  .transform((value) => value === '1' || value === 'true');

const schema = z
  .object({
    NODE_ENV: z.enum(['development', 'test', 'production']).default('development'),
    DATABASE_URL: z.url({ protocol: /^postgres(ql)?$/ }),
    OWNER_DATABASE_URL: z.url({ protocol: /^postgres(ql)?$/ }).optional(),
    PORT: z.coerce.number().int().min(0).max(65_535).default(4180),
    HOST: z.string().min(1).default('127.0.0.1'),
    DEMO: flag,
    APP_SECRET: z.string().min(32),
    PUBLIC_URL: z.url({ protocol: /^https?$/ }).transform((url) => url.replace(/\/+$/, '')),
    BLOB_DIR: z.string().min(1),
    DIST_DIR: z.string().min(1),
    TLS_CERT: z.string().min(1).optional(),
    TLS_KEY: z.string().min(1).optional(),
    LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent']).default('info'),
  })
  .superRefine((env, context) => {
    const refuse = (path: string, message: string) => context.addIssue({ code: 'custom', path: [path], message });
    if (Boolean(env.TLS_CERT) !== Boolean(env.TLS_KEY)) refuse('TLS_CERT', 'TLS_CERT and TLS_KEY go together');
    if (env.NODE_ENV !== 'production') return;
    if (env.DEMO) refuse('DEMO', 'the demo shows its passwords and PINs: it cannot run in production');
    if (/demo/i.test(env.APP_SECRET)) refuse('APP_SECRET', 'this is a secret of the demo: make one of your own');
    if (new Set(env.APP_SECRET).size < 10) refuse('APP_SECRET', 'too simple: take 32 random bytes');
  });

/** Everything the server reads from its environment, validated once. */
export interface Config {
  production: boolean;
  databaseUrl: string;
  port: number;
  host: string;
  demo: boolean;
  appSecret: string;
  publicUrl: string;
  /** The public address is https, so that cookies can be marked secure. */
  secure: boolean;
  blobDir: string;
  distDir: string;
  tls: { cert: string; key: string } | null;
  logLevel: string;
}

/** Reads the configuration; throws one message that names every wrong variable. */
export const readConfig = (environment: Record<string, string | undefined>): Config => {
  const parsed = schema.safeParse(environment);
  if (!parsed.success) {
    const lines = parsed.error.issues.map((issue) => `  ${issue.path.join('.')}: ${issue.message}`);
    throw new Error(`The configuration does not do:\n${lines.join('\n')}`);
  }
  const env = parsed.data;
  return {
    production: env.NODE_ENV === 'production',
    databaseUrl: env.DATABASE_URL,
    port: env.PORT,
    host: env.HOST,
    demo: env.DEMO,
    appSecret: env.APP_SECRET,
    publicUrl: env.PUBLIC_URL,
    secure: env.PUBLIC_URL.startsWith('https:'),
    blobDir: env.BLOB_DIR,
    distDir: env.DIST_DIR,
    tls: env.TLS_CERT && env.TLS_KEY ? { cert: env.TLS_CERT, key: env.TLS_KEY } : null,
    logLevel: env.LOG_LEVEL,
  };
};
