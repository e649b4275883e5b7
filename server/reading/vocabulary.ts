import type { ColumnRole } from './readingResult.js'

const list = (...lines: string[]): string[] => lines.flatMap((line) => line.split(', '))

/**
 * Words that head columns in laboratory files, by what they mean: English, German, French, Spanish, Italian, Portuguese,
 * Dutch, Polish, Swedish, Czech, Russian, Chinese, Japanese, Korean. Lower case, without accents, signs replaced by
 * blanks; a word counts when it stands whole. A new language is a few more words here.
 */
export const ROLE_WORDS: readonly { role: ColumnRole; words: readonly string[] }[] = [
  {
    role: 'ignored',
    words: list(
      'iqe, internal quantum efficiency, interne quanteneffizienz, integrated, cumulative, cumulated',
      'jsc, isc, j sc, current density, stromdichte, densite de courant, densidad de corriente',
      'densita di corrente, integriert, kumuliert, cumulee, acumulada, cumulata, time, zeit, temps',
      'tiempo, tempo, date, datum, index, no, nr, nummer, number, point, punkt, temperature, temperatur',
      'temperatura, filter, grating, gitter, flag, status, bandwidth, bandbreite, slit, photon flux',
      'photonenfluss, extraterrestrial, etr, absorptance, absorption, 1 r, 100 r',
    ),
  },
  {
    role: 'noise',
    words: list(
      'noise, std, stdev, std dev, stddev, standard deviation, sigma, σ, uncertainty, error, err, u eqe',
      'standard error, rauschen, standardabweichung, unsicherheit, messunsicherheit, fehler, bruit',
      'ecart type, incertitude, erreur, ruido, desviacion estandar, desviacion, incertidumbre, rumore',
      'deviazione standard, incertezza, errore, incerteza, desvio padrao, ruis, onzekerheid, niepewnosc',
      'szum, osakerhet, brus, nejistota, погрешность, шум, 不确定度, 不確かさ, 標準偏差, 标准偏差, 오차',
    ),
  },
  {
    role: 'wavelength',
    words: list(
      'wavelength, wave length, wavelengths, wvlgth, wvl, wl, lambda, λ, wellenlange, wellenlaenge',
      'longueur d onde, longueur donde, longueur, longitud de onda, long de onda, lunghezza d onda',
      'lunghezza donda, lunghezza, comprimento de onda, golflengte, dlugosc fali, vaglangd',
      'bolgelaengde, bolgelengde, vlnova delka, hullamhossz, aallonpituus, dalga boyu, длина волны, 波长',
      '波長, 파장, photon energy, photonenergie, energie du photon, energie photon, energia del foton',
      'energia de foton, energia del fotone, energia fotonica, energy, energie, energia, hv, hν',
    ),
  },
  {
    role: 'responsivity',
    words: list(
      'spectral response, spectral responsivity, responsivity, response, sr, spektrale empfindlichkeit',
      'spektralempfindlichkeit, empfindlichkeit, reponse spectrale, sensibilite spectrale, sensibilite',
      'respuesta espectral, responsividad, sensibilidad, risposta spettrale, responsivita',
      'sensibilita spettrale, resposta espectral, responsividade, spectrale gevoeligheid',
      'czulosc widmowa, спектральная чувствительность, 光谱响应, 分光感度, 응답도',
    ),
  },
  {
    role: 'eqe',
    words: list(
      'eqe, ipce, qe, external quantum efficiency, quantum efficiency, ext quantum efficiency, ece',
      'externe quanteneffizienz, externe quantenausbeute, quanteneffizienz, quantenausbeute',
      'rendement quantique externe, rendement quantique, efficacite quantique externe',
      'efficacite quantique, eficiencia cuantica externa, eficiencia cuantica',
      'efficienza quantica esterna, efficienza quantica, eficiencia quantica externa',
      'eficiencia quantica, externe kwantumefficientie, kwantumefficientie, wydajnosc kwantowa',
      'kvantverkningsgrad, kvantova ucinnost, квантовая эффективность, 外量子效率, 外部量子効率, 量子效率, 量子効率',
      '외부양자효율, 양자효율',
    ),
  },
  {
    role: 'reflectance',
    words: list(
      'reflectance, reflectivity, reflection, total reflectance, reflexion, reflexionsgrad, reflektanz',
      'reflektion, reflectivite, facteur de reflexion, reflectancia, reflectividad, riflettanza',
      'riflettivita, riflessione, refletancia, reflexao, reflectie, odbicie, reflektans, odrazivost',
      'отражение, 反射率, 반사율',
    ),
  },
  {
    role: 'transmittance',
    words: list(
      'transmittance, transmission, transmissionsgrad, transmissivity, transmitancia, trasmittanza',
      'trasmissione, transmissie, transmitans, пропускание, 透射率, 透過率, 투과율',
    ),
  },
  {
    role: 'irradiance',
    words: list(
      'irradiance, spectral irradiance, global tilt, direct circumsolar, bestrahlungsstarke',
      'spektrale bestrahlungsstarke, eclairement, eclairement spectral, irradiancia',
      'irradiancia espectral, irradianza, irradianza spettrale, irradiance spectrale, irradiantie',
      'natezenie napromienienia, irradians, облученность, 辐照度, 放射照度, 분광복사조도, am1 5g, am1 5d, am0',
    ),
  },
  { role: 'phase', words: list('phase, theta, θ, phi, φ, phasenwinkel, fase, faza') },
  {
    role: 'signal-x',
    words: list('x, in phase, inphase, lock in x, lockin x, signal x, x signal, x channel, realteil'),
  },
  {
    role: 'signal-y',
    words: list('y, quadrature, lock in y, lockin y, signal y, y signal, y channel, quadratur'),
  },
  { role: 'dark', words: list('dark, dark signal, stray, stray light, background, dunkel, dunkelsignal') },
  { role: 'monitor', words: list('monitor, monitor diode, monitordiode, monitor signal, lamp monitor') },
  {
    role: 'reference',
    words: list('reference, ref, reference detector, reference signal, referenz, referenzdetektor, calibration'),
  },
  {
    role: 'magnitude',
    words: list('magnitude, amplitude, signal, betrag, lock in, lockin, voltage, spannung, tension'),
  },
]

/** A lone letter heads a column only together with a sign of its quantity. */
export const LETTER_ROLES: Readonly<Record<string, ColumnRole>> = { r: 'reflectance', t: 'transmittance' }

/** Words that name a junction: a column headed by one holds the quantity that the file is about. */
export const JUNCTION_WORDS: readonly string[] = list(
  'top, middle, mid, bottom, bot, upper, lower, subcell, sub cell, junction, cell, device, sample',
  'scan, oben, mitte, unten, oberzelle, unterzelle, mittelzelle, zelle, teilzelle, probe',
  'superieure, inferieure, cellule, superior, inferior, celda, muestra, superiore, inferiore, cella',
  'campione, perovskite, perowskit, silicon, silizium, si, pk, gainp, gaas, ge, gainas, cigs',
)
