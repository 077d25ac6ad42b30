/*
 * The words of headings: what is measured, and where on the installation. English first, with the common technical words of Spanish,
 * French, Portuguese and German. Common practice, no source.
 */

/** What a heading says is measured. */
export type Measured =
  | 'ripple'
  | 'pressure'
  | 'head'
  | 'level'
  | 'flow'
  | 'volume'
  | 'beats'
  | 'pulses'
  | 'count'
  | 'temperature'
  | 'battery'
  | 'voltage';
/** Where it is measured. */
export type Place =
  | 'chamber'
  | 'drive'
  | 'source'
  | 'tank'
  | 'delivery'
  | 'waste'
  | 'weir'
  | 'air'
  | 'logger'
  | 'solar';
/** What else a heading says. */
export type Quality = 'total' | 'interval' | 'rate' | 'mean' | 'extreme' | 'record' | 'status' | 'meter';

/** A stem matches where a word contains it; a stem with = before it is the whole word. */
const measured: Record<Measured, string> = {
  ripple:
    'ripple pulsation amplitude =p2p =pkpk =pp =ptp rizado ondulat ondulac schwank welligkeit peaktopeak peak-to-peak',
  pressure: 'press presion druck pressao =p =pr =prs =psi =kpa =bar =mbar',
  head: '=head =hd =charge =carga forderhohe',
  level:
    'level =lvl =lev depth stage gauge nivel niveau nivell fullstand wasserstand behalterstand pegel =cota altura hauteur hohe =ht wasserst tirant',
  flow: 'flow debit caudal vazao durchfl gasto discharge =q ablauf abfluss zufluss',
  volume: 'volume =vol volumen litre liter litro gallon totali integr kubik =m3',
  beats: 'beat stroke cycle clack knock battement coup golpe batida schlag takt =hub hube ariet belier',
  pulses: 'pulse impuls pulso impulso =puls',
  count: 'count =cnt =ctr contador compteur zahler zaehler conteo contagem =zahl',
  temperature: 'temp =t thermo =wt',
  battery: 'batt =bat =vbat =ubat bateria =pile akku',
  voltage: 'volt spannung =tension',
};

const places: Record<Place, string> = {
  weir: 'weir notch vertedero deversoir vertedor wehr vnotch v-notch',
  chamber: 'chamber vessel windkessel kessel camara =cloche campana campanula =ac =airv airvessel',
  waste: 'waste spill reject =wv desperdicio rechazo perte perdida perda verlust abschlag stossventil',
  drive: 'drive =ram =body =box valvebox =vb inlet motriz motrice alimentacion accionamiento treib trieb =dp',
  source:
    'source =src spring intake forebay stream river creek =dam =feed supply fuente manantial =toma captage =prise nascente =rio riviere quelle =bach zulauf weiher =pond',
  tank: 'tank reserv cistern storage tanque deposito =cuve citerne cisterna behalter speicher estanque bassin =res caixa',
  delivery:
    'deliver =del =dlv rising riser =rise outlet output impulsion refoul recalque elevacao elevacion steig lieferung forder outflow pumped discharge',
  air: 'baro atmos ambient =air =aire =luft luftdruck =atm external outside outdoor',
  logger: 'logger internal =int =box housing enclosure board =cpu =chip =case',
  solar: 'solar panel =pv charger',
};

const qualities: Record<Quality, string> = {
  total:
    'total cumul running counter contador compteur zahler zaehler acumul gesamt =sum summe odometer totali lifetime laufend',
  interval: 'interval =per =delta =incr increment period intervalo intervalle intervall',
  rate: '=rate =bpm =spm =cpm =freq frequen permin =minute tasa cadence =rpm',
  mean: '=avg =mean average =av promedio moyen media mittel =smp',
  extreme: '=min =max minimum maximum =std =sd stdev =dev =peak minimo maximo',
  record: '=record =rec =no =nr =n =index =idx =sample =scan =id =seq =row =line =num entry registro =lfd numero numer',
  status:
    'status =flag =flags alarm =error =errors =err quality =qc signal rssi humid =code =mode comment =note notes event remark =msg message memory =mem =lat =lon =rh',
  meter: '=meter =flowmeter watermeter =wm medidor caudalimetro =compteur wasserzahler wasseruhr hidrometro debitmetre',
};

export interface HeadingWords {
  measured: Set<Measured>;
  places: Set<Place>;
  qualities: Set<Quality>;
}

export function headingWords(label: string): HeadingWords {
  const tokens = tokensOf(label);
  return {
    measured: matching(measured, tokens),
    places: matching(places, tokens),
    qualities: matching(qualities, tokens),
  };
}

/** Words of a heading in small letters without accents, split at capitals, marks and figures: tankLevel_2 becomes tank, level. */
function tokensOf(label: string): string[] {
  const plain = label.normalize('NFD').replace(/\p{M}/gu, '').replace(/ß/g, 'ss');
  const words = plain
    .replace(/([a-z])([A-Z])/g, '$1 $2')
    .replace(/\bpeak[ -]to[ -]peak\b|\bpk[ -]?pk\b/gi, 'peaktopeak')
    .replace(/\bper (?=minute|min\b)/gi, 'per')
    .toLowerCase()
    .split(/[^a-z0-9#]+/)
    .map((word) => word.replace(/^\d+|\d+$/g, ''))
    .filter((word) => word !== '');
  return [...new Set(words)];
}

const compiled = new Map<string, { stem: string; isWhole: boolean }[]>();

function stemsOf(list: string): { stem: string; isWhole: boolean }[] {
  let stems = compiled.get(list);
  if (stems === undefined) {
    stems = list.split(' ').map((text) => ({ stem: text.replace('=', ''), isWhole: text.startsWith('=') }));
    compiled.set(list, stems);
  }
  return stems;
}

function matching<Name extends string>(vocabulary: Record<Name, string>, tokens: readonly string[]): Set<Name> {
  const found = new Set<Name>();
  for (const [name, list] of Object.entries(vocabulary) as [Name, string][])
    if (
      stemsOf(list).some(({ stem, isWhole }) =>
        tokens.some((token) => (isWhole ? token === stem : token.includes(stem))),
      )
    )
      found.add(name);
  return found;
}
