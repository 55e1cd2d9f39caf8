import cookie from '@fastify/cookie';
import helmet from '@fastify/helmet';
import statics from '@fastify/static';
import type { NestFastifyApplication } from '@nestjs/platform-fastify';
import type { Settings } from '../../config.js';
import { staticFolders } from '../layout/static-files.js';
import { existsSync } from 'node:fs';
import { acceptFileForms } from './multipart.js';

/** Largest body that is read, in bytes. */
export const bodyLimitBytes = 1_000_000;

/** Cookies, security headers and static files, on the server under the application. */
export async function installWeb(app: NestFastifyApplication, settings: Settings): Promise<void> {
  const isEncrypted = settings.publicUrl?.startsWith('https:') ?? false;
  acceptFileForms(app.getHttpAdapter().getInstance());
  await app.register(cookie);
  await app.register(helmet, {
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'none'"],
        scriptSrc: ["'self'"],
        styleSrc: ["'self'"],
        imgSrc: ["'self'"],
        fontSrc: ["'self'"],
        mediaSrc: ["'self'"],
        connectSrc: ["'self'"],
        manifestSrc: ["'self'"],
        workerSrc: ["'self'"],
        formAction: ["'self'"],
        baseUri: ["'none'"],
        frameAncestors: ["'none'"],
      },
    },
    referrerPolicy: { policy: 'same-origin' },
    // Asking for encryption where there is none would lock people out of a local machine.
    strictTransportSecurity: isEncrypted ? { maxAge: 15_552_000 } : false,
  });
  for (const [index, { prefix, folder }] of staticFolders.entries()) {
    if (!existsSync(folder)) continue;
    await app.register(statics, {
      root: folder,
      prefix: `/static/${prefix}/`,
      decorateReply: index === 0,
      index: false,
      dotfiles: 'ignore',
      // The address carries a mark of the content.
      maxAge: '365d',
      immutable: true,
    });
  }
}
