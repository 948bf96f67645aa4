/** Text that is HTML already, so that it is not escaped a second time. */
export class Html {
  constructor(readonly text: string) {}
}

type Piece = Html | Html[] | string | number | null | undefined | false;

/** Builds HTML from a template; everything put in is escaped unless it is HTML itself. */
export function html(parts: TemplateStringsArray, ...pieces: Piece[]): Html {
  const texts = parts.map((part, place) => part + inserted(pieces[place]));
  return new Html(texts.join(''));
}

function inserted(piece: Piece): string {
  if (piece instanceof Html) return piece.text;
  if (Array.isArray(piece)) return piece.map((each) => each.text).join('');
  if (piece === null || piece === undefined || piece === false) return '';
  return escapeHtml(String(piece));
}

const entities: Record<string, string> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (character) => entities[character] ?? character);
}

/** A whole page in the look the stand-ins share. */
export function page(title: string, main: Html): string {
  return html`<!doctype html>
    <html lang="en">
      <head>
        <meta charset="utf-8" />
        <meta name="viewport" content="width=device-width, initial-scale=1" />
        <meta name="color-scheme" content="light dark" />
        <title>${title}</title>
        <link rel="icon" href="data:," />
        <link rel="stylesheet" href="/look/look.css" />
      </head>
      <body>
        <main>${main}</main>
      </body>
    </html>`.text;
}
