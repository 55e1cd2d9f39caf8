/** The main navigation, in the order shown; the home page repeats it with what each is for. */
export const navigation: readonly {
  readonly href: string;
  readonly label: string;
  readonly about: string;
}[] = [{ href: '/', label: 'Home', about: '' }];
