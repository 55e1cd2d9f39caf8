import { Controller, Get, Query } from '@nestjs/common';
import { ReturnsPage } from './http/exchange.js';
import { navigation } from './layout/navigation.js';
import { Page, pageHtml } from './layout/page.js';
import { CurrentViewer, type Viewer } from './session/viewer.js';
import { en, noticeNamed } from './texts/en.js';

/** Where a person lands after sign-in. */
@Controller()
export class HomeController {
  @Get()
  @ReturnsPage()
  home(@CurrentViewer() viewer: Viewer, @Query('notice') notice: unknown): string {
    return pageHtml(
      <Page title={en.home.title} viewer={viewer} path="/" notice={noticeNamed(notice)}>
        <h1>{en.product}</h1>
        <p class="lead">{en.home.intro}</p>
        <ul class="doors">
          {navigation
            .filter(({ href }) => href !== '/')
            .map(({ href, label, about }) => (
              <li key={href}>
                <a href={href}>{label}</a>
                <p>{about}</p>
              </li>
            ))}
        </ul>
      </Page>,
    );
  }
}
