// What a page has to load, made smaller at build time without a change in what it does: white space in style sheets, and the parts
// of two packages that nothing here uses. Each step fails loudly if a package is not as it was when the step was written.
import fs from 'node:fs';
import path from 'node:path';

/** Style sheets in css`…` without comments, line breaks and indentation; texts in quotes stay as they are. */
export function minifiedCss(css) {
  return css
    .split(/('(?:[^'\\]|\\.)*'|"(?:[^"\\]|\\.)*")/)
    .map((piece, i) =>
      i % 2 === 1
        ? piece
        : piece
            .replace(/\/\*[\s\S]*?\*\//g, '')
            .replace(/\s+/g, ' ')
            .replace(/ ?([{};]) ?/g, '$1')
            .replace(/([:,]) /g, '$1')
            .replace(/;}/g, '}'),
    )
    .join('');
}

/** The templates of a source file that are style sheets, minified; what stands in ${…} stays. */
export const withMinifiedCss = (source) =>
  source.replace(/\bcss`([^`]*)`/g, (_, text) => {
    const pieces = text.split(/(\$\{[^}]*\})/);
    return `css\`${pieces.map((piece, i) => (i % 2 === 1 ? piece : minifiedCss(piece))).join('')}\``;
  });

/** Sources of the elements with small templates: their style sheets minified, no indentation in front of tags. */
export const smallTemplates = {
  name: 'small-templates',
  setup(build) {
    build.onLoad({ filter: /[/\\]components[/\\].*\.ts$/ }, async ({ path: file }) => {
      const source = await fs.promises.readFile(file, 'utf8');
      return { contents: withMinifiedCss(source).replace(/\n[ \t]+/g, '\n'), loader: 'ts' };
    });
  },
};

/** Methods of decimal.js that this project calls nowhere: functions beyond arithmetic and roots, other number bases, fractions,
 *  rounding to whole numbers, other ways to print. */
export const UNUSED_METHODS =
  'cos sin tan cosh sinh tanh acos asin atan acosh asinh atanh cbrt log exp ln pow clamp toBinary toFraction toHex toNearest toOctal divToInt isInt isNaN isPos mod round trunc toPrecision'.split(
    ' ',
  );
/** What only they call, and the static twins of all methods. */
const UNUSED_FUNCTIONS =
  'cosine sine taylorSeries tinyPow toLessThanHalfPi toStringBinary naturalExponential naturalLogarithm getLn10 getPi isOdd maxOrMin abs acos acosh add asin asinh atan atanh atan2 cbrt ceil clamp cos cosh div exp floor hypot ln log log10 log2 max min mod mul pow random round sign sin sinh sqrt sub sum tan tanh trunc'.split(
    ' ',
  );
const STATIC_KEPT = ['config', 'clone', 'isDecimal', 'prototype', 'EUCLID'];

function cut(source, pattern, what) {
  const left = source.replace(pattern, '');
  if (left === source) throw new Error(`decimal.js is not as expected: ${what} was not found`);
  return left;
}

/** decimal.js with arithmetic, roots, rounding and printing only. */
export function smallDecimal(source) {
  let text = source.replaceAll('\r\n', '\n').replace(/\/\*(?!!)[\s\S]*?\*\//g, '');
  for (const name of UNUSED_METHODS)
    text = cut(text, new RegExp(`^P\\.(?:\\w+ = P\\.)?${name} = function[\\s\\S]*?^\\};\\n`, 'm'), `method ${name}`);
  for (const name of UNUSED_FUNCTIONS)
    text = cut(text, new RegExp(`^function ${name}\\([\\s\\S]*?^\\}\\n`, 'm'), `function ${name}`);
  // texts in other bases than ten are refused, as anything else that is no number
  const readers = /(^function parseOther\([\s\S]*?return x;\n {2}\}\n)[\s\S]*?^\}\n/m;
  if (!readers.test(text)) throw new Error('decimal.js is not as expected: parseOther was not found');
  text = text.replace(readers, '$1  throw Error(invalidArgument + str);\n}\n');
  text = text.replace(/^ {2}Decimal\.(\w+) = .*\n/gm, (line, name) =>
    STATIC_KEPT.includes(name) || name.startsWith('ROUND_') || name === 'config' ? line : '',
  );
  for (const constant of ['LN10', 'PI'])
    text = cut(text, new RegExp(`(?<=^ {2}${constant} = '\\d\\.\\d{4})\\d{1000,}`, 'm'), `constant ${constant}`);
  const code = text.replace(/\/\/.*$/gm, '');
  const called = UNUSED_FUNCTIONS.filter((name) => new RegExp(`(?<![.\\w])${name}\\(`).test(code));
  if (called.length > 0) throw new Error(`decimal.js calls ${called.join(', ')}, which was to be left out`);
  const methods = UNUSED_METHODS.filter((name) => new RegExp(`\\.${name}\\(`).test(code));
  if (methods.length > 0) throw new Error(`decimal.js calls ${methods.join(', ')} of itself, which was to be left out`);
  return text;
}

/** The geodesic routines from their sources: distances, with or without lines; areas and polygons never. */
export function smallGeodesic(folder, { lines }) {
  const read = (name) => fs.readFileSync(path.join(folder, 'src', name), 'utf8').replaceAll('\r\n', '\n');
  const less = (text, pattern, what, put = '') => {
    if (!pattern.test(text)) throw new Error(`geographiclib-geodesic is not as expected: ${what} was not found`);
    return text.replace(pattern, put);
  };
  let math = read('Math.js');
  math = less(
    math,
    /\(function\((?:(?!\(function\()[\s\S])*\}\)\(geodesic\.Accumulator, geodesic\.Math\);/,
    'the accumulator',
  );
  let geodesic = read('Geodesic.js');
  geodesic = less(geodesic, /C4_coeff = \[[\s\S]*?\];/, 'coefficients of the area', 'C4_coeff = [];');
  geodesic = less(geodesic, /^ {4}this\.C4coeff\(\);\n/m, 'their use');
  for (const name of ['C4coeff', 'C4f'])
    geodesic = less(
      geodesic,
      new RegExp(`^ {2}g\\.Geodesic\\.prototype\\.${name} = function[\\s\\S]*?^ {2}\\};\\n`, 'm'),
      name,
    );
  geodesic = less(geodesic, /^ {2}g\.Geodesic\.prototype\.Polygon = function[\s\S]*?^ {2}\};\n/m, 'Polygon');
  if (!lines)
    geodesic = less(
      geodesic,
      /^ {2}g\.Geodesic\.prototype\.GenDirect = [\s\S]*(?=^ {2}g\.WGS84 = )/m,
      'what follows a geodesic',
    );
  const text = [math, geodesic, ...(lines ? [read('GeodesicLine.js')] : [])].join('\n');
  return `/*! geographiclib-geodesic: Copyright (c) Charles Karney (2011-2022), MIT licence */\n${text}\nmodule.exports = geodesic;\n`;
}

/** Both packages made smaller. @param lines whether something in the bundle follows a geodesic, not only measures it */
export const smallPackages = ({ lines }) => ({
  name: 'small-packages',
  setup(build) {
    build.onLoad({ filter: /[/\\]decimal\.js[/\\]decimal\.mjs$/ }, async ({ path: file }) => ({
      contents: smallDecimal(await fs.promises.readFile(file, 'utf8')),
      loader: 'js',
    }));
    // a method that is left out must not be called one day: numbers have some of the same names, decimals none of them
    build.onLoad({ filter: /[/\\]lib[/\\]quantity[/\\].*\.ts$/ }, async ({ path: file }) => {
      const source = await fs.promises.readFile(file, 'utf8');
      const used = UNUSED_METHODS.filter((name) => new RegExp(`(?<!Math|Number)\\.${name}\\(`).test(source));
      const decimals = /from '\.\/decimal\.js'/.test(source) ? used : [];
      if (decimals.length > 0)
        throw new Error(`${file} calls ${decimals.join(', ')}, which scripts/smaller.mjs takes out of decimal.js`);
      return undefined;
    });
    build.onLoad({ filter: /geographiclib-geodesic\.min\.js$/ }, ({ path: file }) => ({
      contents: smallGeodesic(path.dirname(file), { lines }),
      loader: 'js',
    }));
  },
});
