/** A mail in words; both of its parts are made from this. */
export interface Letter {
  to: string;
  subject: string;
  paragraphs: string[];
  link?: { text: string; url: string };
  closing?: string;
}

export function textPart({ paragraphs, link, closing }: Letter): string {
  const lines = [...paragraphs, ...(link ? [`${link.text}:\n${link.url}`] : []), ...(closing ? [closing] : [])];
  return `${lines.join('\n\n')}\n`;
}

export function htmlPart({ subject, paragraphs, link, closing }: Letter): string {
  const body = [
    ...paragraphs.map((paragraph) => `<p>${escapeHtml(paragraph)}</p>`),
    ...(link ? [`<p><a href="${escapeHtml(link.url)}">${escapeHtml(link.text)}</a></p>`] : []),
    ...(closing ? [`<p>${escapeHtml(closing)}</p>`] : []),
  ];
  return `<!doctype html><html lang="en"><head><meta charset="utf-8"><title>${escapeHtml(subject)}</title></head><body>${body.join('')}</body></html>`;
}

export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (character) => `&#${character.charCodeAt(0)};`);
}
