import { describe, expect, test } from 'vitest';
import { fileNameOf } from '../../../main/electron/file-name.ts';
import { menuTemplate } from '../../../main/electron/menu-template.ts';
import { startFileOf } from '../../../main/electron/start-file.ts';
import { windowPlace } from '../../../main/electron/window-place.ts';

const SCREEN = { x: 0, y: 0, width: 1920, height: 1080 };
const LEFT = { x: -1280, y: 0, width: 1280, height: 1024 };

describe('where the window opens', () => {
  test('where it was', () => {
    const bounds = { x: 100, y: 50, width: 1300, height: 800 };
    const place = windowPlace({ bounds, isMaximized: false }, [SCREEN]);
    expect(place).toEqual({ bounds, isMaximized: false, size: { width: 1300, height: 800 } });
    const onLeft = { x: -1200, y: 50, width: 1000, height: 800 };
    expect(windowPlace({ bounds: onLeft, isMaximized: true }, [SCREEN, LEFT])).toMatchObject({
      bounds: onLeft,
      isMaximized: true,
    });
  });

  test.each([
    ['on a screen that is gone', { x: -1200, y: 50, width: 1000, height: 800 }],
    ['with its title above the screen', { x: 100, y: -60, width: 1000, height: 800 }],
    ['below the screen', { x: 100, y: 1060, width: 1000, height: 800 }],
    ['with hardly anything to see', { x: 1850, y: 50, width: 1000, height: 800 }],
  ])('at the system’s choice when it was %s', (_name, bounds) => {
    expect(windowPlace({ bounds, isMaximized: false }, [SCREEN])).toEqual({
      isMaximized: false,
      size: { width: 1440, height: 900 },
    });
  });

  test.each([undefined, null, 'x', {}, { bounds: {}, isMaximized: true }, { bounds: { x: 'a' } }])(
    'a remembered place that is none (%j) counts for nothing',
    (remembered) => {
      expect(windowPlace(remembered, [SCREEN])).toEqual({ isMaximized: false, size: { width: 1440, height: 900 } });
    },
  );

  test('never too small to use', () => {
    const place = windowPlace({ bounds: { x: 0, y: 0, width: 10, height: 10 }, isMaximized: false }, [SCREEN]);
    expect(place.size).toEqual({ width: 1440, height: 900 });
    const narrow = windowPlace({ bounds: { x: 0, y: 0, width: 300, height: 100 }, isMaximized: false }, [SCREEN]);
    expect(narrow.size).toEqual({ width: 800, height: 560 });
  });
});

test.each([
  [['quietboard', 'valve.quietboard'], '/home/a/valve.quietboard'],
  [['electron', '.', '--enable-logging', '/b/Valve.QUIETBOARD'], '/b/Valve.QUIETBOARD'],
  [['quietboard', 'a.quietboard', 'b.quietboard'], '/home/a/b.quietboard'],
  [['quietboard', '--x.quietboard'], undefined],
  [['quietboard', 'board.json'], undefined],
  [['a.quietboard'], undefined],
])('the project of the command line %j is %s', (commandLine, file) => {
  expect(startFileOf(commandLine, '/home/a')).toBe(file);
});

test('a name becomes a file name on every system', () => {
  expect(fileNameOf('a/b\\c:d*e?f"g<h>i|j\u0007k.pdf')).toBe('a-b-c-d-e-f-g-h-i-j-k.pdf');
});

describe('the system’s menu', () => {
  const command = (name: string, group: string, keys: string | null, isEnabled = true) => ({
    name,
    label: `Do ${name}`,
    group,
    keys,
    isEnabled,
  });
  const commands = [
    command('open', 'File', 'Mod+O'),
    command('undo', 'Edit', 'Mod+Shift+Z', false),
    command('next', 'View', 'ArrowRight'),
    command('about', 'Help', null),
  ];

  test('groups in order, keys in the system’s words, nothing registered', () => {
    const chosen: string[] = [];
    const menu = menuTemplate(commands, (name) => chosen.push(name), 'linux');
    expect(menu.map(({ label }) => label)).toEqual(['File', 'Edit', 'View', 'Help']);
    const items = menu.map(({ submenu }) => (submenu as Electron.MenuItemConstructorOptions[])[0]!);
    expect(items.map(({ accelerator }) => accelerator)).toEqual([
      'CommandOrControl+O',
      'CommandOrControl+Shift+Z',
      'Right',
      undefined,
    ]);
    expect(items.map(({ enabled }) => enabled)).toEqual([true, false, true, true]);
    expect(items.every(({ registerAccelerator }) => registerAccelerator === false)).toBe(true);
    (items[0]!.click as () => void)();
    expect(chosen).toEqual(['open']);
  });

  test('a Mac has its own first and last menu', () => {
    const menu = menuTemplate(commands, () => undefined, 'darwin');
    expect(menu.map(({ role, label }) => role ?? label)).toEqual([
      'appMenu',
      'File',
      'Edit',
      'View',
      'Help',
      'windowMenu',
    ]);
  });
});
