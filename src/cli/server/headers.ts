/** Headers of every answer: what a page served here may do, and who may ask. */

const contentSecurityPolicy = [
  "default-src 'self'",
  // 'wasm-unsafe-eval' lets WebAssembly be compiled (the HDF5 library, the kernels) and nothing else:
  // eval and inline scripts stay forbidden.
  "script-src 'self' 'wasm-unsafe-eval'",
  "worker-src 'self'",
  "style-src 'self'",
  "img-src 'self' data: blob:",
  "font-src 'self'",
  "connect-src 'self'",
  "object-src 'none'",
  "base-uri 'none'",
  "frame-ancestors 'none'",
  "form-action 'none'",
].join('; ');

/** Cross-origin isolation (for shared memory and exact clocks), and nothing from or to another address. */
export const securityHeaders: Readonly<Record<string, string>> = {
  'Cross-Origin-Opener-Policy': 'same-origin',
  'Cross-Origin-Embedder-Policy': 'require-corp',
  'Cross-Origin-Resource-Policy': 'same-origin',
  'X-Content-Type-Options': 'nosniff',
  'Referrer-Policy': 'no-referrer',
  'Content-Security-Policy': contentSecurityPolicy,
};

/**
 * Whether a Host header names this machine. A page elsewhere may point a name of its own at 127.0.0.1
 * (DNS rebinding) and would then count as the same origin; its Host header gives it away.
 */
export function isLocalHost(host: string | undefined): boolean {
  return /^(?:127\.0\.0\.1|localhost|\[::1\])(?::\d{1,5})?$/i.test(host ?? '');
}
