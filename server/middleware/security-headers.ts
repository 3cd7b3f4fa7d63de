import type { RequestHandler } from 'express'

/** The client loads nothing from elsewhere. PrimeVue writes its theme into style elements, hence inline styles. */
const POLICY = [
  "default-src 'self'",
  "style-src 'self' 'unsafe-inline'",
  "img-src 'self' data: blob:",
  "worker-src 'self' blob:",
  "object-src 'none'",
  "base-uri 'none'",
  "form-action 'self'",
  "frame-ancestors 'none'",
].join('; ')

export const securityHeaders =
  (isHttps: boolean): RequestHandler =>
  (_req, res, next) => {
    res.set({
      'content-security-policy': POLICY,
      'cross-origin-opener-policy': 'same-origin',
      'cross-origin-resource-policy': 'same-origin',
      // A mail link's token must not leave with a request to somewhere else.
      'referrer-policy': 'no-referrer',
      'x-content-type-options': 'nosniff',
      'x-frame-options': 'DENY',
      ...(isHttps && { 'strict-transport-security': 'max-age=31536000' }),
    })
    next()
  }
