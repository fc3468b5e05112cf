/**
 * Line colours in order of wind speed, cool to warm. Found by search: at least 3.2 : 1 against the sheet, and as far
 * apart as nine colours get (OKLab distance 0.11 or more) for full colour vision and, by the matrices of Machado,
 * Oliveira and Fernandes 2009, for protanopia, deuteranopia and tritanopia.
 */
export const COLOURS = {
  light: ['#738be5', '#20045c', '#6850b9', '#5d3862', '#d4538d', '#380812', '#835c33', '#a68b11', '#214601'],
  dark: ['#75a3e0', '#b4d2fd', '#7554d4', '#945a84', '#d3a7a1', '#c24305', '#ed7c38', '#f3d228', '#d5f9d2'],
} as const;

/** The same colours as classes for inline charts. */
export function seriesStyle(): string {
  const rules = (colours: readonly string[]): string =>
    colours.map((c, i) => `.s${i}{stroke:${c}}.c${i}{fill:${c}}`).join('');
  return `${rules(COLOURS.light)}@media screen and (prefers-color-scheme: dark){${rules(COLOURS.dark)}}`;
}
