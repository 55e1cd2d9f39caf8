/** The main navigation, in the order shown; the home page repeats it with what each is for. */
export const navigation: readonly {
  readonly href: string;
  readonly label: string;
  readonly about: string;
}[] = [
  { href: '/', label: 'Home', about: '' },
  {
    href: '/venues',
    label: 'Venues',
    about: 'Rooms with their sizes, openings and air, each figure with where it comes from.',
  },
  {
    href: '/plans',
    label: 'Plans',
    about: 'What is released where, what people breathe, and the decision with its reasons.',
  },
];
