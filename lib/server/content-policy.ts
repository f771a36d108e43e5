/**
 * The content security policy of a page. Scripts run only with this request's nonce (and what they load themselves);
 * workers, connections and forms stay on this site. Attribute styles are allowed: diagrams and sliders set them.
 */
export function contentPolicy(nonce: string, isDevelopment: boolean, isSecureSite: boolean): string {
  const rules = [
    "default-src 'self'",
    // development compiles modules with eval and writes its styles without a nonce
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${isDevelopment ? " 'unsafe-eval'" : ""}`,
    `style-src-elem 'self' ${isDevelopment ? "'unsafe-inline'" : `'nonce-${nonce}'`}`,
    "style-src-attr 'unsafe-inline'",
    // plots are exported as pictures through blob: and data:
    "img-src 'self' data: blob:",
    "font-src 'self'",
    `connect-src 'self'${isDevelopment ? " ws:" : ""}`,
    "worker-src 'self'",
    "object-src 'none'",
    "base-uri 'none'",
    "form-action 'self'",
    "frame-ancestors 'none'",
  ];
  if (isSecureSite) rules.push("upgrade-insecure-requests");
  return rules.join("; ");
}
