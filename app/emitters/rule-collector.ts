import type { Point3M } from '../board/board.ts';
import { ElementCollector, type ElementSet } from '../fields/element-set.ts';
import { type SiteFrame, toSitePoint, toSiteVector } from '../site/site.ts';
import { type CurrentRule, type PackedRules, packRules } from './element-currents.ts';

/** Elements of a net in site axes, each with the rule its current follows. */
export interface RuledElements {
  readonly elements: ElementSet;
  readonly rules: PackedRules;
}

/** Collects elements given in board axes. */
export class RuleCollector {
  readonly #frame: SiteFrame;
  readonly #collector = new ElementCollector();
  readonly #rules: CurrentRule[] = [];

  constructor(frame: SiteFrame) {
    this.#frame = frame;
  }

  add(positionM: Point3M, vectorM: Point3M, rule: CurrentRule): void {
    this.#collector.add(toSitePoint(this.#frame, positionM), toSiteVector(this.#frame.orientation, vectorM));
    this.#rules.push(rule);
  }

  finish(): RuledElements {
    return { elements: this.#collector.finish(), rules: packRules(this.#rules) };
  }
}
