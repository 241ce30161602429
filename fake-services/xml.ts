import type { ServerResponse } from 'node:http';

/** Answers XML. */
export function xml(response: ServerResponse, text: string): void {
  response
    .writeHead(200, { 'content-type': 'application/xml' })
    .end(`<?xml version="1.0" encoding="UTF-8"?>${text}`);
}

/** Text as it stands in XML. */
export function escape(text: string): string {
  return text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;');
}

/** The text again. */
export function unescape(text: string): string {
  return text
    .replaceAll('&quot;', '"')
    .replaceAll('&gt;', '>')
    .replaceAll('&lt;', '<')
    .replaceAll('&amp;', '&');
}
