import { describe, inputError } from '../errors.ts';
import { nsToS, pfToF } from '../units/convert.ts';
import type { Drive, Load, Net, Pin, Waveform } from './board.ts';
import type { BoardFile } from './board-file.ts';
import { References } from './references.ts';

type DriveFile = NonNullable<BoardFile['drives']>[number];
type LoadFile = NonNullable<BoardFile['loads']>[number];

/** Parts that drive nets by common reference letters: integrated circuits, crystals and oscillators, transistors. */
const DRIVER_LIKE = /^(U|IC|Y|X|Q)\d/i;

/**
 * Drives and loads in SI, pins chosen where the file leaves them open.
 *
 * - Drive without a pin: the net's first pin (in file order) of a part whose reference is U, IC, Y, X or Q with a
 *   number; without such a part the first pin. Pins that another drive names are passed over.
 * - Load without a pin: the pin farthest (straight line) from the net's first drive that has no drive or load yet.
 *
 * What was chosen, driven nets without a load and loads without a drive are noted.
 * Throws `input` for unknown nets, pins, waveforms, a waveform in amperes, two entries on one pin, no pin left.
 */
export function convertDrives(
  file: BoardFile,
  nets: readonly Net[],
  waveforms: readonly Waveform[],
  notes: string[],
): { drives: Drive[]; loads: Load[] } {
  const references = new References(file.nets, waveforms);
  const netOf = new Map(nets.map((net) => [net.name, net]));
  const driverPins = new PinsInUse('drives', file.drives ?? [], references);
  const drives = (file.drives ?? []).map((drive, i): Drive => {
    references.waveform(drive.waveform, `drives[${i}].waveform`, 'V');
    const pin = drive.pin ?? driverPins.take(drive.net, chooseDriver(netOf.get(drive.net)!, driverPins, i));
    return convertDrive(drive, pin);
  });
  const loadPins = new PinsInUse('loads', file.loads ?? [], references);
  const loads = (file.loads ?? []).map((load, i): Load => {
    const driver = drives.find((drive) => drive.net === load.net)?.pin;
    const choose = () => chooseLoad(netOf.get(load.net)!, driver, driverPins, loadPins, i);
    return convertLoad(load, load.pin ?? loadPins.take(load.net, choose()));
  });
  noteChoices(drives, loads, nets, notes);
  return { drives, loads };
}

const convertDrive = (drive: DriveFile, pin: string): Drive => ({
  net: drive.net,
  pin,
  waveform: drive.waveform,
  sourceOhm: drive.sourceOhm,
  seriesOhm: drive.seriesOhm,
  delayS: nsToS(drive.delayNs),
  isInverted: drive.inverted,
  isPinChosen: drive.pin === undefined,
});

const convertLoad = (load: LoadFile, pin: string): Load => ({
  net: load.net,
  pin,
  ...(load.resistanceOhm !== undefined && { resistanceOhm: load.resistanceOhm }),
  capacitanceF: pfToF(load.capacitancePf ?? 0),
  isPinChosen: load.pin === undefined,
});

/** The pins one list (drives or loads) uses, by net. Names in the file are checked and taken at once. */
class PinsInUse {
  readonly #byNet = new Map<string, Set<string>>();

  constructor(
    list: 'drives' | 'loads',
    entries: readonly { readonly net: string; readonly pin?: string | undefined }[],
    references: References,
  ) {
    for (const [i, { net: netName, pin }] of entries.entries()) {
      const net = references.net(netName, `${list}[${i}].net`);
      if (pin === undefined) continue;
      references.pin(net, pin, `${list}[${i}].pin`);
      if (this.has(netName, pin)) throw inputError(`${list}[${i}].pin`, `a pin that no other of the ${list} uses`, pin);
      this.take(netName, pin);
    }
  }

  has(net: string, pin: string): boolean {
    return this.#byNet.get(net)?.has(pin) === true;
  }

  take(net: string, pin: string): string {
    const pins = this.#byNet.get(net) ?? new Set();
    this.#byNet.set(net, pins.add(pin));
    return pin;
  }
}

function chooseDriver(net: Net, driverPins: PinsInUse, i: number): string {
  const free = net.pins.filter((pin) => !driverPins.has(net.name, pin.name));
  const pin = free.find(({ name }) => DRIVER_LIKE.test(name)) ?? free[0];
  if (pin === undefined) throw inputError(`drives[${i}].net`, 'a net with a free pin to drive', net.name);
  return pin.name;
}

function chooseLoad(
  net: Net,
  driver: string | undefined,
  driverPins: PinsInUse,
  loadPins: PinsInUse,
  i: number,
): string {
  const free = net.pins.filter((pin) => !driverPins.has(net.name, pin.name) && !loadPins.has(net.name, pin.name));
  const from = net.pins.find((pin) => pin.name === driver) ?? net.pins[0];
  const farthest = free.reduce<Pin | undefined>(
    (best, pin) => (best === undefined || distanceM(pin, from!) > distanceM(best, from!) ? pin : best),
    undefined,
  );
  if (farthest === undefined) throw inputError(`loads[${i}].net`, 'a net with a free pin for the load', net.name);
  return farthest.name;
}

const distanceM = (a: Pin, b: Pin): number => Math.hypot(a.atM[0] - b.atM[0], a.atM[1] - b.atM[1]);

function noteChoices(drives: readonly Drive[], loads: readonly Load[], nets: readonly Net[], notes: string[]): void {
  const at = ({ net, pin }: { net: string; pin: string }) => `${describe(net)} at ${describe(pin)}`;
  const named = (net: string) => describe(net);
  const driven = new Set(drives.map((drive) => drive.net));
  const loaded = new Set(loads.map((load) => load.net));
  const withoutTraces = nets.filter((net) => driven.has(net.name) && net.traces.length === 0);
  const say = (text: string, items: readonly string[]) => {
    if (items.length > 0) notes.push(`${text}: ${items.join(', ')}.`);
  };
  const chosen = (list: readonly (Drive | Load)[]) => list.filter((entry) => entry.isPinChosen).map(at);
  say(
    'Driver pin not stated, chosen by the program (first pin of a U, IC, Y, X or Q part, else the first)',
    chosen(drives),
  );
  say('Load pin not stated, chosen by the program (farthest from the driver)', chosen(loads));
  say('Driven net without a load, its far end is open', [...driven].filter((net) => !loaded.has(net)).map(named));
  say('Load on a net without a drive, it has no effect', [...loaded].filter((net) => !driven.has(net)).map(named));
  say(
    'Driven net without traces, it radiates nothing by itself',
    withoutTraces.map((net) => named(net.name)),
  );
}
