import type { RequestHandler } from 'express';
import helmet from 'helmet';

const self = ["'self'"];
const none = ["'none'"];

/** Nothing but what the server itself sends; styles may be set from scripts, which Quasar does. */
export const securityHeaders = (): RequestHandler =>
  helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: self,
        scriptSrc: self,
        styleSrc: [...self, "'unsafe-inline'"],
        imgSrc: [...self, 'data:'],
        objectSrc: none,
        baseUri: self,
        formAction: self,
        frameAncestors: none,
      },
    },
    // Browsers ignore it on plain http, and behind https it is the proxy's to decide for its name.
    strictTransportSecurity: false,
    referrerPolicy: { policy: 'no-referrer' },
  });
