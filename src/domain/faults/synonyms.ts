/**
 * What the trade calls the same thing. A question with one of a row finds notes with any other of it; rows are not
 * chained (a thermistor may be either kind, a PTC is not an NTC). Common usage at the bench.
 */
export const SYNONYMS: readonly (readonly string[])[] = [
  // Parts
  ['mov', 'varistor', 'vdr', 'metal oxide varistor', 'voltage dependent resistor'],
  ['ptc', 'thermistor', 'resettable fuse', 'positive temperature coefficient'],
  ['ntc', 'thermistor', 'inrush limiter', 'negative temperature coefficient'],
  ['gdt', 'gas tube', 'gas discharge tube', 'surge arrester', 'spark gap'],
  ['zener', 'tvs', 'transient suppressor', 'avalanche diode'],
  ['clamp', 'clamp transistor', 'clamping diode', 'diode connected transistor'],
  ['capacitor', 'cap', 'condenser'],
  ['electrolytic', 'filter capacitor', 'smoothing capacitor', 'reservoir capacitor'],
  ['trimmer', 'trimpot', 'pot', 'preset', 'potentiometer'],
  ['shunt', 'sense resistor', 'current sense resistor'],
  ['divider', 'resistor chain', 'attenuator', 'resistor string'],
  ['fusible', 'flameproof', 'flame proof', 'safety resistor'],
  ['hrc', 'high rupturing capacity', 'high breaking capacity', 'sand filled', 'ceramic fuse'],
  ['elastomeric', 'zebra', 'conductive rubber', 'rubber connector'],
  ['relay', 'reed'],
  ['bjt', 'transistor'],
  ['pass transistor', 'series transistor', 'output transistor'],
  ['ic', 'chip', 'integrated circuit'],
  ['eeprom', 'calibration memory', 'memory chip'],
  ['converter', 'adc', 'analogue to digital'],
  ['op amp', 'opamp', 'operational amplifier'],
  ['rectifier', 'bridge', 'diode bridge'],
  ['jack', 'socket', 'banana', 'input terminal'],
  ['switch', 'selector', 'rotary', 'wafer', 'dial'],
  ['display', 'lcd', 'screen'],
  ['buzzer', 'beeper', 'sounder'],
  ['battery', 'cell', 'batt'],

  // What went wrong
  ['open', 'blown', 'open circuit', 'interrupted'],
  ['short', 'shorted', 'short circuit', 'bridged'],
  ['leak', 'leaky', 'leakage', 'leaking', 'leaked'],
  ['drift', 'drifted', 'drifting', 'wander', 'unstable', 'creep'],
  ['dead', 'no display', 'no power', 'nothing display', 'will turn', 'blank'],
  ['burnt', 'burned', 'charred', 'scorched', 'overheated'],
  ['corroded', 'corrosion', 'oxidised', 'oxidized', 'oxide', 'tarnished', 'verdigris'],
  ['contamination', 'contaminated', 'residue', 'dirt', 'dirty', 'flux', 'grime'],
  ['wet', 'moisture', 'damp', 'water', 'humidity'],
  ['dry joint', 'cold joint', 'cracked joint', 'solder joint'],
  ['dried', 'aged', 'bulged', 'esr'],
  ['ol', 'overload', 'over range', 'overrange', 'infinite'],
  ['jump', 'jumpy', 'erratic', 'intermittent', 'flicker'],
  ['trips', 'limits', 'foldback'],

  // What is measured
  ['amp', 'current', 'amperage', 'milliamp'],
  ['ohm', 'resistance', 'ohmmeter'],
  ['volt', 'voltage'],
  ['continuity', 'beep', 'buzz', 'buzzer'],
  ['capacitance', 'farad'],
  ['mains', 'line voltage', '230v', '240v', 'power line'],
  ['hv', 'high voltage', 'kilovolt'],
  ['zero', 'offset', 'null'],
  ['calibration', 'adjustment', 'cal'],

  // Instruments
  ['multimeter', 'dmm', 'multitester'],
  ['clamp meter', 'current clamp', 'tong tester'],
  ['insulation tester', 'megohmmeter', 'insulation meter'],
  ['bench supply', 'power supply', 'psu', 'lab supply'],
  ['scope', 'oscilloscope'],
  ['lead', 'probe', 'test lead'],
];
