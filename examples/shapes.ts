import { makeCurve, valueAt, type Curve } from '../shared/physics/curve.js'
import { inventedDevices } from '../server/demonstration/devices.js'
import { gridNm, numberRows, textRows, type Numbers } from './writing.js'
import { workbook } from './workbooks.js'

/** One file that holds the EQE of the top and the bottom cell of the same tandem, in one of the shapes of laboratories. */
export interface ShapedFile {
  name: string
  /** What is particular about it. */
  shape: string
  bytes: Buffer
  /** Headers of the columns of top and bottom where the table alone does not tell them, for the device file. */
  columns?: { top: string | number; bottom: string | number; wavelength?: string | number }
  sheet?: string
}

const [, , TANDEM] = inventedDevices().split
export const SHAPED_DEVICE = TANDEM!
export const SHAPE_GRID_NM = gridNm(300, 1200, 5)

const onGrid = (curve: Curve): Curve =>
  makeCurve(
    SHAPE_GRID_NM,
    SHAPE_GRID_NM.map((nm) => valueAt(curve, nm)),
  )
/** The curves that every shaped file holds: the truth of the device, without noise, on the grid of the files. */
export const SHAPED_EQES: readonly [Curve, Curve] = [
  onGrid(SHAPED_DEVICE.truth.eqes[0]!),
  onGrid(SHAPED_DEVICE.truth.eqes[1]!),
]

const rows = (how: Numbers = {}) => textRows(SHAPE_GRID_NM, SHAPED_EQES, how)
const joined = (separator: string, how: Numbers = {}) => rows(how).map((row) => row.join(separator))
const utf8 = (lines: readonly string[], newline = '\n') => Buffer.from([...lines, ''].join(newline), 'utf8')
const latin1 = (lines: readonly string[], newline = '\r\n') => Buffer.from([...lines, ''].join(newline), 'latin1')
const BY_NUMBER = { wavelength: 1, top: 2, bottom: 3 }

/** Lines that end now in CRLF, now in LF, as when two programs wrote to one file. */
const mixedEnds = (lines: readonly string[]) => lines.map((line, i) => line + (i % 3 === 0 ? '\r\n' : '\n')).join('')

const beside = (left: string[][], right: string[][]) =>
  left.map((row, i) => [...row, '', ...(right[i] ?? [])].join(';'))

export function shapedFiles(): ShapedFile[] {
  return [...texts(), ...languages(), ...layouts(), ...workbooks()]
}

function texts(): ShapedFile[] {
  return [
    {
      name: 'comma-fraction-nm.csv',
      shape: 'comma, decimal point, fraction, nm, ascending',
      bytes: utf8(['Wavelength (nm),EQE Top,EQE Bottom', ...joined(',')]),
    },
    {
      name: 'tab-percent-nm.tsv',
      shape: 'tab, decimal point, percent, descending',
      bytes: utf8([
        'Wavelength (nm)\tTop EQE (%)\tBottom EQE (%)',
        ...joined('\t', { valueUnit: 'percent', order: 'descending' }),
      ]),
    },
    {
      name: 'tabs-under-the-name-csv.csv',
      shape: 'tabs in a file called .csv, decimal comma, CRLF',
      bytes: utf8(
        ['Wavelength/nm\tTop EQE/%\tBottom EQE/%', ...joined('\t', { valueUnit: 'percent', decimalMark: ',' })],
        '\r\n',
      ),
    },
    {
      name: 'blanks-responsivity.txt',
      shape: 'blanks, responsivity in A/W',
      bytes: utf8([
        '# tandem, responsivity of both subcells',
        'Wavelength (nm)   Top (A/W)   Bottom (A/W)',
        ...joined('   ', { valueUnit: 'A/W' }).map((line) => `  ${line}`),
      ]),
    },
    {
      name: 'micrometres.csv',
      shape: 'wavelengths in µm, a units row, quoted headers',
      bytes: utf8([
        '"Wavelength","EQE, Top","EQE, Bottom"',
        '"(µm)","(%)","(%)"',
        ...joined(',', { wavelengthUnit: 'um', valueUnit: 'percent' }),
      ]),
    },
    {
      name: 'photon-energy.dat',
      shape: 'photon energies in eV, ascending, so wavelengths descend; comment lines',
      bytes: utf8([
        '# lock-in scan, two subcells',
        '# lamp: halogen and xenon',
        '# Photon energy (eV)\tEQE Top\tEQE Bottom',
        ...joined('\t', { wavelengthUnit: 'eV', order: 'descending' }),
      ]),
    },
    {
      name: 'angstrom.csv',
      shape: 'wavelengths in Å, semicolon, decimal point',
      bytes: utf8([
        'Wavelength (Å);EQE Top (%);EQE Bottom (%)',
        ...joined(';', { wavelengthUnit: 'angstrom', valueUnit: 'percent' }),
      ]),
    },
    {
      name: 'no-headers.txt',
      shape: 'numbers only: units are taken from the ranges',
      bytes: utf8(joined(' ')),
      columns: BY_NUMBER,
    },
  ]
}

function languages(): ShapedFile[] {
  const commas: Numbers = { valueUnit: 'percent', decimalMark: ',' }
  return [
    {
      name: 'german-iso-8859-1.csv',
      shape: 'German, semicolon, decimal comma, ISO-8859-1, CRLF and LF mixed',
      bytes: Buffer.from(
        mixedEnds([
          'Probe: Tandem 3',
          'Temperatur: 25 °C',
          'Wellenlänge (nm);EQE Oberzelle (%);EQE Unterzelle (%)',
          ...joined(';', commas),
        ]),
        'latin1',
      ),
      columns: { top: 'EQE Oberzelle (%)', bottom: 'EQE Unterzelle (%)' },
    },
    {
      name: 'french-utf-16.txt',
      shape: 'French, tab, decimal comma, UTF-16 with its mark',
      bytes: Buffer.from(
        `\ufeff${["Longueur d'onde (nm)\tRendement quantique externe, supérieure (%)\tRendement quantique externe, inférieure (%)", ...joined('\t', commas)].join('\r\n')}\r\n`,
        'utf16le',
      ),
      columns: BY_NUMBER,
    },
    {
      name: 'spanish-marked-utf-8.csv',
      shape: 'Spanish, semicolon, decimal comma, UTF-8 with its mark, units row',
      bytes: utf8([
        '\ufeffLongitud de onda;Eficiencia cuántica externa superior;Eficiencia cuántica externa inferior',
        'nm;%;%',
        ...joined(';', commas),
      ]),
      columns: BY_NUMBER,
    },
    {
      name: 'italian-responsivity.csv',
      shape: 'Italian, responsivity in A/W, ISO-8859-1, descending',
      bytes: latin1([
        "Lunghezza d'onda (nm);Responsività superiore (A/W);Responsività inferiore (A/W)",
        ...joined(';', { valueUnit: 'A/W', decimalMark: ',', order: 'descending' }),
      ]),
      columns: BY_NUMBER,
    },
  ]
}

function layouts(): ShapedFile[] {
  const percent: Numbers = { valueUnit: 'percent' }
  const one = (curve: Curve) => textRows(SHAPE_GRID_NM, [curve], percent)
  return [
    {
      name: 'section-after-marker.ini',
      shape: 'settings as in an INI file, a marker, then the table',
      bytes: utf8([
        '[Instrument]',
        'Gain=1e6',
        'TimeConstant=0.3',
        'Range=300 1200',
        '',
        '[Data]',
        'Wavelength (nm)\tEQE Top (%)\tEQE Bottom (%)',
        ...joined('\t', percent),
      ]),
    },
    {
      name: 'groups-of-headers.csv',
      shape: 'three lines of headers: quantity, junction, unit',
      bytes: utf8([',EQE,EQE', 'Wavelength,Top,Bottom', 'nm,%,%', ...joined(',', percent)]),
    },
    {
      name: 'noise-and-integral.csv',
      shape: 'columns that are no EQE between those that are: noise, running integral',
      bytes: utf8([
        'Wavelength (nm),EQE Top (%),Std Top (%),EQE Bottom (%),Std Bottom (%),Integrated Jsc (mA/cm2)',
        ...rows(percent).map(([nm, top, bottom], i) =>
          [nm, top, '0.0300', bottom, '0.0300', (0.2 * i).toFixed(3)].join(','),
        ),
      ]),
    },
    {
      name: 'side-by-side.csv',
      shape: 'two tables side by side, a blank column between, names two lines above',
      bytes: utf8([
        'Top;;;Bottom;',
        'scanned on one afternoon',
        'Wavelength (nm);EQE (%);;Wavelength (nm);EQE (%)',
        ...beside(one(SHAPED_EQES[0]), one(SHAPED_EQES[1])),
      ]),
      columns: { top: 2, bottom: 5 },
    },
  ]
}

function workbooks(): ShapedFile[] {
  const headers = ['Wavelength (nm)', 'EQE Top (%)', 'EQE Bottom (%)']
  return [
    {
      name: 'workbook.xlsx',
      shape: 'XLSX, percent, a title above',
      bytes: workbook([
        {
          name: 'EQE',
          cells: [['Tandem 3'], [], headers, ...numberRows(SHAPE_GRID_NM, SHAPED_EQES, { valueUnit: 'percent' })],
        },
      ]),
    },
    {
      name: 'workbook-second-sheet.xlsx',
      shape: 'XLSX, notes on the first sheet and the scan on the second, cells shown as percentages',
      bytes: workbook([
        {
          name: 'Notes',
          cells: [
            ['Operator', 'night shift'],
            ['Lamp', 'changed on Monday'],
          ],
        },
        {
          name: 'Scan',
          cells: [['Wavelength (nm)', 'EQE Top', 'EQE Bottom'], ...numberRows(SHAPE_GRID_NM, SHAPED_EQES)],
          format: { fromRow: 1, fromColumn: 1, code: '0.00%' },
        },
      ]),
      sheet: 'Scan',
    },
  ]
}
