const REMEDY = 'Numbers and dates are formatted in shared/units only (number-text, value-and-sigma, angles, date-text, file-size), so that they look alike everywhere.'

/**
 * Ways to format that belong to shared/units.
 * @type {{ selector: string, message: string }[]}
 */
export const ONE_PLACE_THAT_FORMATS = [
  { selector: 'CallExpression[callee.property.name=/^(?:toFixed|toPrecision|toExponential|toLocale\\w*)$/]', message: REMEDY },
  { selector: "MemberExpression[object.name='Intl']", message: REMEDY },
]
