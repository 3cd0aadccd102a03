import { decimalSignWords, delimiterWords, encodingWords } from '../../shared-kinetics/contract/import-options.ts'
import { baselineKinds } from '../../shared-kinetics/tasks/study-input.ts'
import { methodsOnRequest } from '../../shared-kinetics/contract/methods-on-request.ts'
import { methodIds, type MethodId } from '../../shared-kinetics/isoconversional/result.ts'
import { reactionModelCodes } from '../../shared-kinetics/reaction-models/registry.ts'
import { signalQuantities } from '../../shared-kinetics/series/signal-quantity.ts'

const onRequest: readonly MethodId[] = methodsOnRequest

/** A list that goes on under its first word, so many words a line. */
const listed = (words: readonly string[], aLine = 5): string =>
  words.map((word, i) => (i === 0 ? word : i % aLine === 0 ? `,\n${' '.repeat(30)}${word}` : `, ${word}`)).join('')

export const generalHelp = `rampfold <command> [paths] [options]

Activation energy against conversion from thermal-analysis exports at several heating rates.

Commands
  inspect PATH…               how each file is read
  activation PATH… --out DIR  activation energy against conversion
  rate-constants TABLE --out DIR
                              activation energy from rate constants at several temperatures
  open [PATH…]                the sheet in a browser

A path is a file, or a folder that stands for the exports in it.
rampfold <command> --help tells the options of a command; --version tells the version.

Exit codes: 0 done; 1 the input cannot be used; 2 the words of the call are off;
3 with --strict, when a finding of severity stop stands.
`

const importHelp = `Reading the files (what is left out is decided and explained; see inspect)
  --encoding WORD             utf-8, utf-16le, utf-16be, windows-1252
  --delimiter WORD            comma, semicolon, tab, pipe, blanks
  --decimal-sign WORD         point, comma
  --heading-line N            line of the column names, counted from 1, or none
  --first-data-line N         line of the first row of numbers
  --exothermic WORD           up, down: which way an exothermic event points
  --column WORDS              one column, by number or heading: 3=mass:mg, "HRR=heat-release", 2=:K,
                              4=set-aside; may be given several times
`

export const inspectHelp = `rampfold inspect PATH… [options]

Tells how each file was read: encoding, delimiter, decimal sign, columns with quantity and unit, metadata,
rows, measured heating rate and what was noticed.

  --json                      the same as JSON

${importHelp}`

export const activationHelp = `rampfold activation PATH… --out DIR [options]

Works out activation energy against conversion and writes activation.json, activation.csv (with
activation.csv.txt beside it) and activation.svg into DIR; a short table appears on the screen.

  --out DIR                   where the files go; those of these names are replaced, others left alone
  --levels SPEC               levels of conversion: first:last:step (default 0.05:0.95:0.05) or a list 0.1,0.5,0.9
  --methods LIST              of: ${listed(methodIds.filter((id) => !onRequest.includes(id)))}
                              (default: all of these that apply), and on request:
                              ${listed(onRequest)}
  --heating-rates LIST        nominal heating rates in K/min, in the order of the runs
  --signal WORD               ${signalQuantities.join(', ')}
                              (default: the first of these that every run has)
  --window SPEC               for all runs: 430K:870K, 156C:500C, or 10min:90min for holds
  --baseline WORD             under heat flow: ${baselineKinds.join(', ')}
  --uncertainty               also intervals by resampling the runs (jackknife, bootstrap) and from measured
                              sources (draws, with a budget). For these, standard uncertainties; what is not
                              stated is assumed, and 0 leaves it out:
  --temperature-common T      of all temperatures alike, 0.5K where nothing is stated
  --temperature-run T         of each run's temperatures, 0.5K
  --lag TIME                  of the time the sample lags behind the thermometer, 1s
                              (--temperature-common and --lag widen every combined interval, assumed or
                              stated: state what your calibration shows)
  --stated-heating-rate P     of a heating rate that was stated and not measured, 2%
  --draws N                   2000
  --seed N                    start of random numbers, 1
  --decimal WORD              of activation.csv: point (default), comma
  --separator WORD            of activation.csv: comma (default), semicolon (default with decimal comma), tab
  --strict                    exit code 3 when a finding of severity stop stands (the files are written)
  --skip-unusable             leave out files and runs that cannot be used, with a finding
  --quiet                     no table and no progress

${importHelp}`

export const rateConstantsHelp = `rampfold rate-constants TABLE --out DIR [options]
rampfold rate-constants PATH… --model CODE --out DIR [options]

Works out Ea and A from rate constants against temperature, with intervals, predicted rate constants, factor per 10 K
and transition-state parameters, and writes rate-constants.json, rate-constants.csv (with rate-constants.csv.txt beside
it) and rate-constants.svg into DIR; a short table appears on the screen.

TABLE is a text file with a heading for each column: T (°C), T (K) or 1000/T (1/K); k (1/s), k (min-1), k (L/(mol s)),
ln k or log10 k; and, where there are any, u(k) for a standard uncertainty and a label. With --model the paths are
isothermal runs, and k of each is read from g(alpha) = k t under that model.

  --out DIR                   where the files go; those of these names are replaced, others left alone
  --at LIST                   temperatures at which k is predicted, with their unit: "25C,310K"
  --model CODE                reaction model of isothermal runs:
${' '.repeat(30)}${listed(reactionModelCodes, 12)}
  --zero-in-time WORD         with --model: free (default, fitted), fixed (the start of each hold)
  --range SPEC                with --model: conversions used, 0.1:0.9 (default)
  --temperature-unit WORD     K, C, F: for a table that does not say
  --rate-unit UNIT            of k, for a table that does not say: 1/s, 1/min, 1/h, "L/(mol s)", …
  --encoding WORD             ${encodingWords.join(', ')}
  --delimiter WORD            ${delimiterWords.join(', ')}
  --decimal-sign WORD         ${decimalSignWords.join(', ')}
  --decimal WORD              of rate-constants.csv: point (default), comma
  --separator WORD            of rate-constants.csv: comma (default), semicolon (default with decimal comma), tab
  --strict                    exit code 3 when a finding of severity stop stands (the files are written)
  --quiet                     no table
`

export const openHelp = `rampfold open [PATH…] [options]

Opens the sheet in a browser, with the runs of the paths if there are any, and prints its address. The address
works on this machine only; the program ends with Ctrl+C.

  --no-browser                print the address and open nothing
`
