import type { PropertyDeclarations } from 'lit';
import { CampaignElement } from './campaign-element.js';

/** An element of a campaign that is first of all a drawing. */
export abstract class DrawingElement extends CampaignElement {
  static override properties: PropertyDeclarations = { bare: { type: Boolean } };

  /** The drawing with its key alone: no sentence, table, control or provenance. For a page that says these itself. */
  declare bare: boolean;

  constructor() {
    super();
    this.bare = false;
  }

  protected override get signed(): boolean {
    return !this.bare;
  }
}
