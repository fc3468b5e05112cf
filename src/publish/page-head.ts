import { escapeHtml } from './escape.js';

/**
 * Everything of a page before its body: it needs nothing beside itself, and its content policy lets it load nothing.
 * @param title plain text
 * @param style the page's own style sheet
 * @param scripts sources of scripts the policy lets run; none when left out
 */
export function pageHead(title: string, style: string, scripts = ''): string {
  const policy = [
    "default-src 'none'",
    ...(scripts === '' ? [] : [`script-src ${scripts}`]),
    "style-src 'unsafe-inline'",
    `img-src data:${scripts === '' ? '' : ' blob:'}`,
    "base-uri 'none'",
    "form-action 'none'",
  ].join('; ');
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="${escapeHtml(policy)}">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta name="referrer" content="no-referrer">
<link rel="icon" href="data:,">
<title>${escapeHtml(title)}</title>
<style>${style}</style>
</head>`;
}
