/** The name of a family in running text: `Weibull`, `smallest extreme value`. */
export function familyLabel(name: string): string {
  return name === 'weibull' ? 'Weibull' : name.replaceAll('-', ' ');
}
