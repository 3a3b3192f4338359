import { type SVGTemplateResult, svg } from 'lit';

const NUMBER = /^([+\u2212-]?)(\d+)(.*)$/su;

/** A number as SVG text, its digits before the point grouped by three from five on: by a gap, not by a character. */
export function svgNumber(text: string): SVGTemplateResult {
  const match = NUMBER.exec(text);
  const [, sign = '', integer = '', rest = ''] = match ?? [];
  if (!match || integer.length < 5) return svg`${text}`;
  const groups: string[] = [];
  for (let end = integer.length; end > 0; end -= 3) groups.unshift(integer.slice(Math.max(0, end - 3), end));
  return svg`${sign}${groups.map((group, i) =>
    i === 0 ? svg`<tspan>${group}</tspan>` : svg`<tspan dx="2">${group}</tspan>`,
  )}<tspan>${rest}</tspan>`;
}
