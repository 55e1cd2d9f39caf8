import { applyDecorators, Header, type HttpServer } from '@nestjs/common';
import type { NestFastifyApplication } from '@nestjs/platform-fastify';
import type { Viewer } from '../session/signed-in-person.js';

type Server = ReturnType<NestFastifyApplication['getHttpAdapter']>;
type Parts<S> =
  S extends HttpServer<infer Request, infer Reply, infer Instance>
    ? { request: Request; reply: Reply; instance: Instance }
    : never;

/** The server under Nest, for its plugins and hooks. */
export type FastifyServer = Parts<Server>['instance'];
/** A request, with the signed-in person once the session guard has let it pass. */
export type PageRequest = Parts<Server>['request'] & { viewer?: Viewer };
export type PageReply = Parts<Server>['reply'];

/** Marks a handler that returns a whole page as text. */
export const ReturnsPage = (): MethodDecorator & ClassDecorator =>
  applyDecorators(
    Header('content-type', 'text/html; charset=utf-8'),
    Header('cache-control', 'no-store'),
  );

/** Sends a page that a handler cannot simply return, such as a rejected form with status 422. */
export function sendPage(reply: PageReply, html: string, status = 200): void {
  void reply
    .status(status)
    .header('content-type', 'text/html; charset=utf-8')
    .header('cache-control', 'no-store')
    .send(html);
}

/** Sends the browser on with a GET, so that reloading does not save twice. `path` is one of ours. */
export function sendElsewhere(reply: PageReply, path: string): void {
  void reply.status(303).header('location', path).header('cache-control', 'no-store').send();
}

/** Whether the answer belongs to a program rather than to a person with a browser. */
export function wantsJson(request: Pick<PageRequest, 'url' | 'headers'>): boolean {
  if (/^\/api(\/|\?|$)/.test(request.url)) return true;
  return (
    !(request.headers.accept ?? 'text/html').includes('text/html') &&
    (request.headers.accept ?? '').includes('application/json')
  );
}
