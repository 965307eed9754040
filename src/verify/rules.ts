import type { Severity } from '../finding.ts'

export interface Rule {
  readonly severity: Severity
  /** One line: what is wrong. */
  readonly title: string
  /** Why it matters and what to do, printed by `stanchion explain RULE`. */
  readonly explain: string
}

const rule = (severity: Severity, title: string, explain: string): Rule => ({ severity, title, explain })

/** Every finding the tool can make, sorted by name. */
export const RULES = {
  'ambiguous-unit': rule(
    'error',
    'a name that is both a unit and a name of the sheet stands where a unit may stand',
    'A number directly before a name makes a unit. When the sheet has also defined that name, the text has two meanings and nothing is guessed. Write `5*t` for the product, or rename the value; put brackets around a unit, as in `5 (kN/m)`, when only the unit is meant.',
  ),
  'bad-block': rule(
    'error',
    "a block's opening line or a line in it does not have the expected form",
    'Each block has one form: `name = expression` in `given` and `working`, one comparison a line in `check`, `method ID as NAME` for another sheet. The message says what was found and what was expected.',
  ),
  'bad-expression': rule(
    'error',
    'a formula cannot be read',
    'The formula is not well formed, or uses something that sheets do not allow. The caret shows where reading stopped.',
  ),
  'bad-front-matter': rule(
    'error',
    'the YAML at the head of the sheet is missing, malformed or has a wrong field',
    'A sheet begins with front matter between two lines of `---`. It needs at least `sheet` (its number) and `title`. `stanchion new` writes one to start from.',
  ),
  'bad-mathematics': rule(
    'warning',
    'mathematics in prose cannot be set',
    'What stands between `$` signs is TeX as KaTeX knows it. The page shows it as written, marked, until it is corrected. Values that matter belong in blocks, where they are calculated.',
  ),
  'bad-reference': rule(
    'error',
    'a file or method is named in a way that is not allowed',
    'A sheet may use only built-in methods and files inside its own project folder, by a relative path.',
  ),
  'binding-duplicate': rule(
    'error',
    'an input of a used sheet is given twice',
    'Each `given` name of the used sheet may be bound once.',
  ),
  'binding-missing': rule(
    'error',
    'an input that the used sheet needs is not given',
    'The used sheet declares the input as `name : kind`, without a value of its own, so the using sheet must bind it in the `method` block.',
  ),
  'binding-unknown': rule(
    'error',
    'a binding names something the used sheet does not take',
    'Only `given` names of the used sheet can be bound. `stanchion explain METHOD` lists them.',
  ),
  'browser-failed': rule(
    'error',
    'the browser that prints the PDF does not start, or ends before it is done',
    'The PDF is printed by a browser of the Chromium family. The message says what it reported. The HTML does not need it.',
  ),
  'browser-missing': rule(
    'error',
    'there is no browser to print the PDF with',
    'The PDF is printed by Chromium, Chrome or Edge, looked for in the usual places of the system. Another place is named in the environment variable STANCHION_BROWSER. The HTML does not need a browser.',
  ),
  'circular-method': rule(
    'error',
    'a sheet uses itself, directly or through others',
    'The chain of sheets must end. The message shows the chain.',
  ),
  'cross-check-failed': rule(
    'error',
    'two independent routes to the same result differ by more than is allowed',
    'A numerical result is calculated by two routes. When they differ beyond the stated tolerance neither can be trusted; the sheet fails until the cause is found.',
  ),
  'duplicate-name': rule(
    'error',
    'a name is defined twice',
    'A name is defined once, so that a reader finds one value for it. Give the second value its own name.',
  ),
  'file-unreadable': rule(
    'error',
    'a file cannot be read',
    'The file does not exist, is a folder, is not text in UTF-8, or may not be read.',
  ),
  'function-misused': rule(
    'error',
    'a function is called with the wrong number or kind of arguments, or has no answer for them',
    '`stanchion explain FUNCTION` shows how the function is called, its units and its range.',
  ),
  'hold-open': rule(
    'warning',
    'a value awaits confirmation',
    'The statement carries `@hold`. The hold is counted on the first sheet and must be closed before the result is relied on.',
  ),
  'input-kind': rule(
    'error',
    'an input has another dimension or kind than the used sheet expects',
    "The used sheet declares each input's kind, for example `N_Ed : force`.",
  ),
  'internal-error': rule(
    'error',
    'the program failed in a way it should not',
    'This is a fault of the program, not of the sheet. Run again with `--debug` and report what it prints.',
  ),
  'limit-exceeded': rule(
    'error',
    'the sheet is larger or deeper than is allowed',
    'Limits on size, nesting and time keep a sheet from holding up the machine. The message names the limit.',
  ),
  'method-unknown': rule(
    'error',
    'there is no such method or sheet',
    'A built-in method is named by its id, as `en1993-1-1/6.3.1`; `stanchion methods` lists them. Another sheet is named by a relative path ending in `.md`.',
  ),
  'no-checks': rule(
    'warning',
    'the sheet has no check, so nothing is shown to be adequate',
    'A calculation ends in at least one `check` that compares a demand with a capacity.',
  ),
  'not-finite': rule(
    'error',
    'a result is infinite or not a number',
    'A division by zero, or an operation outside its range, has no usable result. Nothing that depends on it is calculated.',
  ),
  'not-real': rule(
    'error',
    'a result is complex',
    'For example the square root of a negative quantity. In a stability calculation this often means a quantity beyond its limit of validity.',
  ),
  'output-unwritable': rule(
    'error',
    'a file cannot be written',
    'The folder is missing, may not be written to, is full or holds something else of that name. No part of the file is left behind.',
  ),
  'picture-left-out': rule(
    'warning',
    'a picture is not on the page',
    'The page loads nothing, neither from the network nor from a file, so that it says the same wherever it is opened. A picture has to be part of the text, as a `data:` address.',
  ),
  'reference-missing': rule(
    'note',
    'an input has no source',
    'Write where a value comes from in square brackets after its meaning: `L = 4.6 m # length [drawing TW-210 rev C]`.',
  ),
  'solver-failed': rule(
    'error',
    'an iteration did not end with a result',
    'The message says how it ended. No number is shown for it.',
  ),
  'undefined-name': rule(
    'error',
    'a name is used before, or without, being defined',
    'Names are defined in `given` and `working` blocks above their use. A unit is only read directly after a number.',
  ),
  'unit-mismatch': rule(
    'error',
    'quantities of unlike dimension are added, compared or used where another dimension is due',
    'A length cannot be added to a time, nor a stress compared with a force. Check the units of both parts.',
  ),
  'unit-unknown': rule(
    'error',
    'there is no such unit',
    'Units are those of the trade: m, mm, kN, MPa, N/mm^2, ft, in, kip, ksi, psf … ; `stanchion explain units` lists them.',
  ),
  'unused-input': rule(
    'warning',
    'an input is never used',
    'A given value that nothing uses is a leftover, or a sign that a formula has the wrong name in it.',
  ),
  'validity-failed': rule(
    'error',
    'a method is used outside its limits of validity',
    "The method's own `check validity` does not hold for the values given. Its result must not be relied on; the method's sheet names its limits.",
  ),
} as const satisfies Record<string, Rule>

export type RuleId = keyof typeof RULES
