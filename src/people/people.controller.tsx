import { Body, Controller, Get, Param, Post, Query, Req, Res, UseGuards } from '@nestjs/common';
import { NotFound } from '../errors.js';
import { PeopleRepository } from '../storage/people.repository.js';
import { checkedForm } from '../web/forms/checked-form.js';
import {
  ReturnsPage,
  sendElsewhere,
  sendPage,
  type PageReply,
  type PageRequest,
} from '../web/http/exchange.js';
import { SignInThrottle } from '../web/http/sign-in-throttle.guard.js';
import { pageHtml } from '../web/layout/page.js';
import { SessionsService } from '../web/session/sessions.service.js';
import { CurrentViewer, OpenToStrangers, type Viewer } from '../web/session/viewer.js';
import { en, noticeNamed } from '../web/texts/en.js';
import { FirstLinkService } from './first-link.service.js';
import { isPasswordOf } from './password.js';
import { AccountPage, FirstAccountPage, SignInPage } from './people-pages.js';
import { FirstAccountForm, SignInForm } from './sign-in.form.js';

/** Where to go after sign-in: only a path of ours, never another site. */
function pathOfOurs(next: unknown): string | undefined {
  return typeof next === 'string' && /^\/(?![/\\])[\w\-./?=&%~]*$/.test(next) ? next : undefined;
}

const usedLink = (): NotFound =>
  new NotFound(
    'This link has been used, has expired, or was never given out.',
    'Sign in, or start Stillair again: while there is no account it prints a new link.',
  );

@Controller()
export class PeopleController {
  constructor(
    private readonly people: PeopleRepository,
    private readonly sessions: SessionsService,
    private readonly firstLink: FirstLinkService,
  ) {}

  @Get('sign-in')
  @OpenToStrangers()
  @ReturnsPage()
  async signInPage(
    @Query('next') next: unknown,
    @Query('notice') notice: unknown,
  ): Promise<string> {
    const isFirstStart = (await this.people.count()) === 0;
    return pageHtml(
      <SignInPage
        next={pathOfOurs(next)}
        notice={noticeNamed(notice)}
        isFirstStart={isFirstStart}
      />,
    );
  }

  @Post('sign-in')
  @OpenToStrangers()
  @UseGuards(SignInThrottle)
  async signIn(
    @Body() body: Record<string, unknown>,
    @Req() request: PageRequest,
    @Res() reply: PageReply,
  ): Promise<void> {
    const { next, ...rest } = body;
    const { form, fields, problems } = checkedForm(SignInForm, rest);
    const account = form && (await this.people.findByEmail(form.email));
    if (
      form !== undefined &&
      (await isPasswordOf(account?.passwordHash, form.password)) &&
      account
    ) {
      await this.sessions.open(request, reply, account);
      sendElsewhere(reply, pathOfOurs(next) ?? '/');
      return;
    }
    const refusal = [{ path: '/email', problem: `${en.signIn.refused} ${en.signIn.refusedHint}` }];
    const state = { values: fields, problems: form === undefined ? problems : refusal };
    const page = <SignInPage next={pathOfOurs(next)} state={state} isFirstStart={false} />;
    sendPage(reply, pageHtml(page), 422);
  }

  @Post('sign-out')
  async signOut(@Req() request: PageRequest, @Res() reply: PageReply): Promise<void> {
    await this.sessions.close(request, reply);
    sendElsewhere(reply, '/sign-in?notice=signedOut');
  }

  @Get('first/:token')
  @OpenToStrangers()
  @UseGuards(SignInThrottle)
  @ReturnsPage()
  async firstPage(@Param('token') token: string): Promise<string> {
    if (!(await this.firstLink.isOpen(token))) throw usedLink();
    return pageHtml(<FirstAccountPage token={token} />);
  }

  @Post('first/:token')
  @OpenToStrangers()
  @UseGuards(SignInThrottle)
  async createFirst(
    @Param('token') token: string,
    @Body() body: unknown,
    @Req() request: PageRequest,
    @Res() reply: PageReply,
  ): Promise<void> {
    if (!(await this.firstLink.isOpen(token))) throw usedLink();
    const { form, fields, problems } = checkedForm(FirstAccountForm, body);
    const mismatch = form !== undefined && form.password !== form.passwordAgain;
    if (form === undefined || mismatch) {
      const state = {
        values: fields,
        problems: mismatch
          ? [
              {
                path: '/passwordAgain',
                problem: 'The two passwords differ: write the same one twice',
              },
            ]
          : problems,
      };
      sendPage(reply, pageHtml(<FirstAccountPage token={token} state={state} />), 422);
      return;
    }
    const account = await this.firstLink.createAdministrator(token, form);
    await this.sessions.open(request, reply, account);
    sendElsewhere(reply, '/?notice=welcome');
  }

  @Get('account')
  @ReturnsPage()
  async account(@CurrentViewer() viewer: Viewer): Promise<string> {
    const people = viewer.role === 'administrator' ? await this.people.list() : undefined;
    return pageHtml(<AccountPage viewer={viewer} people={people} />);
  }
}
