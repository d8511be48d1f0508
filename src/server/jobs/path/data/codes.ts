import type { Code } from '../types.ts';
import { controlDead, crankSignal } from './groups.ts';

/**
 * Trouble codes of the no-start path with their SAE J2012 titles. `titleFrom`: `named` as given with the project's own outside
 * values (SAE J2012DA titles); `listing` read in published listings that quote the standard, not in the standard itself; `memory` recalled.
 * A code points; it never proves.
 */
const crank = { causes: [...crankSignal, 'crank-wheel'], checks: ['crank-trace', 'crank-look'] } as const;
const cam = { causes: ['cam-sensor', 'timing-broken'], checks: ['cam-trace', 'cam-at-sensor'] } as const;
const coil = {
  causes: ['coil', 'coil-driver', 'coil-feed', 'control-fuse'],
  checks: ['coil-feed', 'coil-command', 'coil-primary'],
} as const;
const injector = {
  causes: ['injector-circuit', 'injector-feed', 'control-fuse'],
  checks: ['injector-feed', 'injector-pulse', 'injector-one'],
} as const;
const correlation = {
  causes: ['timing-slipped', 'crank-wheel'],
  checks: ['belt-look', 'cam-phase'],
} as const;
const pump = {
  causes: ['pump-relay', 'pump-wiring', 'fuel-pump'],
  checks: ['pump-relay', 'pump-supply'],
} as const;
const throttle = {
  causes: ['throttle-sensor', 'reference-short'],
  checks: ['throttle-data', 'reference'],
} as const;
const air = {
  causes: ['airflow-sensor', 'air-leak', 'intake-blocked'],
  checks: ['airflow-data', 'intake-look'],
} as const;
const reference = { causes: ['reference-short'], checks: ['reference', 'reference-unplug'] } as const;
const relay = { causes: ['main-relay', 'control-supply'], checks: ['main-relay', 'control-supply'] } as const;
const voltage = {
  causes: ['battery-weak', 'battery-cable', 'charging', 'control-supply'],
  checks: ['battery-rest', 'control-supply'],
} as const;
const unit = { causes: ['control-unit'], checks: ['control-supply', 'control-unit'] } as const;
const misfire = {
  causes: ['coil', 'plugs', 'secondary', 'injector-circuit', 'weak-cylinder'],
  checks: ['which-cylinder', 'plugs-look', 'coil-swap'],
} as const;
const coolant = { causes: ['coolant-sensor'], checks: ['coolant-data'] } as const;
const immobiliser = { causes: ['immobiliser'], checks: ['immobiliser-data'] } as const;

export const CODES: Readonly<Record<string, Code>> = {
  P0016: {
    title: 'Crankshaft Position - Camshaft Position Correlation Bank 1 Sensor A',
    titleFrom: 'named',
    ...correlation,
  },
  P0017: {
    title: 'Crankshaft Position - Camshaft Position Correlation Bank 1 Sensor B',
    titleFrom: 'listing',
    ...correlation,
  },
  P0018: {
    title: 'Crankshaft Position - Camshaft Position Correlation Bank 2 Sensor A',
    titleFrom: 'listing',
    ...correlation,
  },
  P0019: {
    title: 'Crankshaft Position - Camshaft Position Correlation Bank 2 Sensor B',
    titleFrom: 'listing',
    ...correlation,
  },
  P0087: {
    title: 'Fuel Rail/System Pressure - Too Low Bank 1',
    titleFrom: 'named',
    causes: ['fuel-pump', 'fuel-filter', 'regulator', 'tank-empty', 'pump-wiring'],
    checks: ['rail-pressure', 'fuel-flow'],
  },
  P0100: {
    title: 'Mass or Volume Air Flow Sensor A Circuit',
    titleFrom: 'named',
    synonyms: ['Mass or Volume Air Flow Circuit Malfunction'],
    ...air,
  },
  P0102: { title: 'Mass or Volume Air Flow Sensor A Circuit Low', titleFrom: 'memory', ...air },
  P0103: { title: 'Mass or Volume Air Flow Sensor A Circuit High', titleFrom: 'memory', ...air },
  P0117: { title: 'Engine Coolant Temperature Sensor 1 Circuit Low', titleFrom: 'memory', ...coolant },
  P0118: { title: 'Engine Coolant Temperature Sensor 1 Circuit High', titleFrom: 'memory', ...coolant },
  P0120: { title: 'Throttle/Pedal Position Sensor/Switch A Circuit', titleFrom: 'named', ...throttle },
  P0122: { title: 'Throttle/Pedal Position Sensor/Switch A Circuit Low', titleFrom: 'memory', ...throttle },
  P0123: { title: 'Throttle/Pedal Position Sensor/Switch A Circuit High', titleFrom: 'memory', ...throttle },
  P0201: {
    title: 'Cylinder 1 Injector A Circuit',
    titleFrom: 'named',
    synonyms: ['Injector Circuit Malfunction - Cylinder 1'],
    ...injector,
  },
  P0202: { title: 'Cylinder 2 Injector A Circuit', titleFrom: 'memory', ...injector },
  P0203: { title: 'Cylinder 3 Injector A Circuit', titleFrom: 'memory', ...injector },
  P0204: { title: 'Cylinder 4 Injector A Circuit', titleFrom: 'memory', ...injector },
  P0230: {
    title: 'Fuel Pump Primary Circuit',
    titleFrom: 'named',
    synonyms: ['Fuel Pump Primary Circuit Malfunction'],
    ...pump,
  },
  P0231: { title: 'Fuel Pump Secondary Circuit Low', titleFrom: 'memory', ...pump },
  P0232: { title: 'Fuel Pump Secondary Circuit High', titleFrom: 'memory', ...pump },
  P0300: {
    title: 'Random/Multiple Cylinder Misfire Detected',
    titleFrom: 'listing',
    causes: ['air-leak', 'fuel-pump', 'fuel-filter', 'wrong-fuel', 'plugs', 'timing-slipped', 'crank-wheel'],
    checks: ['which-cylinder', 'rail-pressure', 'air-leak'],
  },
  P0301: { title: 'Cylinder 1 Misfire Detected', titleFrom: 'listing', ...misfire },
  P0302: { title: 'Cylinder 2 Misfire Detected', titleFrom: 'listing', ...misfire },
  P0303: { title: 'Cylinder 3 Misfire Detected', titleFrom: 'listing', ...misfire },
  P0304: { title: 'Cylinder 4 Misfire Detected', titleFrom: 'listing', ...misfire },
  P0335: {
    title: 'Crankshaft Position Sensor A Circuit',
    titleFrom: 'named',
    synonyms: ['Crankshaft Position Sensor A Circuit Malfunction'],
    ...crank,
  },
  P0336: { title: 'Crankshaft Position Sensor A Circuit Range/Performance', titleFrom: 'listing', ...crank },
  P0337: {
    title: 'Crankshaft Position Sensor A Circuit Low',
    titleFrom: 'listing',
    synonyms: ['Crankshaft Position Sensor A Circuit Low Input'],
    ...crank,
  },
  P0338: {
    title: 'Crankshaft Position Sensor A Circuit High',
    titleFrom: 'listing',
    synonyms: ['Crankshaft Position Sensor A Circuit High Input'],
    ...crank,
  },
  P0339: { title: 'Crankshaft Position Sensor A Circuit Intermittent', titleFrom: 'listing', ...crank },
  P0340: {
    title: 'Camshaft Position Sensor A Circuit Bank 1 or Single Sensor',
    titleFrom: 'named',
    synonyms: ['Camshaft Position Sensor Circuit Malfunction'],
    ...cam,
  },
  P0341: {
    title: 'Camshaft Position Sensor A Circuit Range/Performance Bank 1 or Single Sensor',
    titleFrom: 'memory',
    synonyms: ['Camshaft Position Sensor Circuit Range/Performance'],
    causes: ['cam-sensor', 'timing-slipped', 'timing-broken'],
    checks: ['cam-trace', 'belt-look'],
  },
  P0342: {
    title: 'Camshaft Position Sensor A Circuit Low Bank 1 or Single Sensor',
    titleFrom: 'memory',
    synonyms: ['Camshaft Position Sensor Circuit Low Input'],
    ...cam,
  },
  P0343: {
    title: 'Camshaft Position Sensor A Circuit High Bank 1 or Single Sensor',
    titleFrom: 'memory',
    synonyms: ['Camshaft Position Sensor Circuit High Input'],
    ...cam,
  },
  P0344: {
    title: 'Camshaft Position Sensor A Circuit Intermittent Bank 1 or Single Sensor',
    titleFrom: 'memory',
    synonyms: ['Camshaft Position Sensor Circuit Intermittent'],
    ...cam,
  },
  P0351: {
    title: 'Ignition Coil A Primary Control Circuit/Open',
    titleFrom: 'named',
    synonyms: ['Ignition Coil A Primary/Secondary Circuit Malfunction'],
    ...coil,
  },
  P0352: {
    title: 'Ignition Coil B Primary Control Circuit/Open',
    titleFrom: 'memory',
    synonyms: ['Ignition Coil B Primary/Secondary Circuit Malfunction'],
    ...coil,
  },
  P0353: {
    title: 'Ignition Coil C Primary Control Circuit/Open',
    titleFrom: 'memory',
    synonyms: ['Ignition Coil C Primary/Secondary Circuit Malfunction'],
    ...coil,
  },
  P0354: {
    title: 'Ignition Coil D Primary Control Circuit/Open',
    titleFrom: 'memory',
    synonyms: ['Ignition Coil D Primary/Secondary Circuit Malfunction'],
    ...coil,
  },
  P0513: { title: 'Incorrect Immobilizer Key', titleFrom: 'listing', ...immobiliser },
  P0560: {
    title: 'System Voltage',
    titleFrom: 'memory',
    synonyms: ['System Voltage Malfunction'],
    ...voltage,
  },
  P0561: { title: 'System Voltage Unstable', titleFrom: 'listing', ...voltage },
  P0562: { title: 'System Voltage Low', titleFrom: 'listing', ...voltage },
  P0601: { title: 'Internal Control Module Memory Check Sum Error', titleFrom: 'listing', ...unit },
  P0606: {
    title: 'Control Module Processor',
    titleFrom: 'memory',
    synonyms: ['PCM Processor Fault'],
    ...unit,
  },
  P0615: {
    title: 'Starter Relay Circuit',
    titleFrom: 'listing',
    causes: ['starter-command'],
    checks: ['starter-feed'],
  },
  P0627: { title: 'Fuel Pump A Control Circuit/Open', titleFrom: 'listing', ...pump },
  P0628: { title: 'Fuel Pump A Control Circuit Low', titleFrom: 'listing', ...pump },
  P0629: { title: 'Fuel Pump A Control Circuit High', titleFrom: 'listing', ...pump },
  P0633: { title: 'Immobilizer Key Not Programmed - ECM/PCM', titleFrom: 'listing', ...immobiliser },
  P0641: { title: 'Sensor Reference Voltage A Circuit/Open', titleFrom: 'listing', ...reference },
  P0642: { title: 'Sensor Reference Voltage A Circuit Low', titleFrom: 'listing', ...reference },
  P0643: { title: 'Sensor Reference Voltage A Circuit High', titleFrom: 'listing', ...reference },
  P0651: { title: 'Sensor Reference Voltage B Circuit/Open', titleFrom: 'listing', ...reference },
  P0652: { title: 'Sensor Reference Voltage B Circuit Low', titleFrom: 'listing', ...reference },
  P0653: { title: 'Sensor Reference Voltage B Circuit High', titleFrom: 'listing', ...reference },
  P0685: { title: 'ECM/PCM Power Relay Control Circuit/Open', titleFrom: 'listing', ...relay },
  P0686: { title: 'ECM/PCM Power Relay Control Circuit Low', titleFrom: 'listing', ...relay },
  P0687: { title: 'ECM/PCM Power Relay Control Circuit High', titleFrom: 'listing', ...relay },
  U0100: {
    title: 'Lost Communication With ECM/PCM A',
    titleFrom: 'listing',
    causes: [...controlDead],
    checks: ['fuses', 'main-relay', 'control-supply'],
  },
};
