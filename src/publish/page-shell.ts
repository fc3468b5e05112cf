import { CAUTIONS } from './cautions.js';
import { escapeHtml } from './escape.js';
import { pageHead } from './page-head.js';
import { PAGE_STYLE } from './page-style.js';
import { oneLine } from './plain-text.js';
import { seriesStyle } from './series-style.js';

/** A page without scripts: drawings and tables in the style of the others. Its policy lets it load nothing at all. */
export interface StaticPage {
  readonly title: string;
  readonly lead: string;
  /** Sections in order: an id, a heading and what stands below it (HTML). */
  readonly sections: readonly { readonly id: string; readonly heading: string; readonly html: string }[];
}

export function staticPage(p: StaticPage): string {
  const nav = p.sections.map((s) => `<a href="#${s.id}">${escapeHtml(s.heading.toLowerCase())}</a>`).join('');
  const body = p.sections
    .map((s) => `<section id="${s.id}"><h2>${escapeHtml(s.heading)}</h2>\n${s.html}\n</section>`)
    .join('\n');
  const title = escapeHtml(oneLine(p.title));
  return `${pageHead(oneLine(p.title), `${PAGE_STYLE}${seriesStyle()}`)}
<body>
<div class="page">
<header>
<h1>${title}</h1>
<p>${escapeHtml(oneLine(p.lead))}</p>
<nav aria-label="Parts of this page">${nav}</nav>
</header>
<main>
${body}
<section class="cautions" id="cautions"><h2>Cautions</h2><ul>${CAUTIONS.map((c) => `<li>${escapeHtml(c)}</li>`).join('')}</ul></section>
</main>
</div>
</body>
</html>
`;
}
