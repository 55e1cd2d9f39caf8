import type { FastifyServer, PageRequest } from './exchange.js';

/**
 * Lets forms carry files: each part becomes a text under its field name, a file like any other. Read
 * by the platform's own parser, within the body limit of every request.
 */
export function acceptFileForms(server: FastifyServer): void {
  server.addContentTypeParser(
    'multipart/form-data',
    { parseAs: 'buffer' },
    async (request: PageRequest, body: Buffer) => {
      const type = request.headers['content-type'] ?? '';
      const bytes =
        typeof body === 'string' ? new TextEncoder().encode(body) : new Uint8Array(body);
      let form: FormData;
      try {
        form = await new Response(bytes, { headers: { 'content-type': type } }).formData();
      } catch {
        // What the parser says is about bytes; the filter answers in words.
        throw Object.assign(new Error('The form is not well formed.'), { statusCode: 400 });
      }
      const fields: Record<string, string> = {};
      for (const [name, part] of form.entries()) {
        fields[name] = typeof part === 'string' ? part : await part.text();
      }
      return fields;
    },
  );
}
