import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { EventStreamParser } from '../../renderer/api/event-stream.ts';

/** Oracle: WHATWG HTML, 9.2.6 "Interpreting an event stream": its rules, applied by hand to one stream. */

const STREAM = [
  ': a comment keeps it alive\n\n',
  'event: job.progress\ndata: {"done":1}\n\n',
  'data: first\ndata: second\n\n',
  'event: nothing\n\n',
  'event:app.command\r\ndata:{"name":"äöü"}\r\n\r\n',
  'event: cut off\ndata: never finished',
].join('');

const EVENTS = [
  { name: 'job.progress', data: '{"done":1}' },
  { name: 'message', data: 'first\nsecond' },
  { name: 'app.command', data: '{"name":"äöü"}' },
];

describe('an event stream', () => {
  it('gives the same events however its pieces arrive', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: STREAM.length })), (cuts) => {
        const places = [0, ...cuts.sort((a, b) => a - b), STREAM.length];
        const parser = new EventStreamParser();
        const events = places.slice(1).flatMap((end, i) => parser.push(STREAM.slice(places[i], end)));
        expect(events).toEqual(EVENTS);
      }),
      { seed: 5, numRuns: 500 },
    );
  });
});
