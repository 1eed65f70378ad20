import helmet from 'helmet';

/** Verified in Chromium with the client's own bundle: no inline code or style, no foreign address, no data: address. */
const PAGE_POLICY = {
  'default-src': ["'none'"],
  'script-src': ["'self'"],
  'style-src': ["'self'"],
  'font-src': ["'self'"],
  'img-src': ["'self'"],
  'connect-src': ["'self'"],
  'form-action': ["'self'"],
  'frame-ancestors': ["'none'"],
  'base-uri': ["'none'"],
  'object-src': ["'none'"],
};

/** What a downloaded file may do if a browser opens it after all: nothing. */
export const DOWNLOAD_POLICY = "default-src 'none'; sandbox";

/**
 * The headers of every answer. The referrer stays within the site rather than vanishing: with `no-referrer` a browser may send
 * `Origin: null`, which the cross-site check would refuse.
 */
export function securityHeaders() {
  return helmet({
    contentSecurityPolicy: { useDefaults: false, directives: PAGE_POLICY },
    referrerPolicy: { policy: 'same-origin' },
    frameguard: { action: 'deny' },
    strictTransportSecurity: { maxAge: 31_536_000, includeSubDomains: false },
  });
}
