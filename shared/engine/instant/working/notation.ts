import type { Model, Place, State } from '../model';
import { positionX, positionY } from '../model';
import type { Level } from '../model';
import type { Reference, Unit, WorkingSymbol } from './working';

/** What places, bodies and their motions are called on the sheet. */
export class Notation {
  constructor(
    private readonly model: Model,
    private readonly state: State,
  ) {}

  bodyName(body: number): string {
    return body === this.model.ground ? 'ground' : this.model.bodies[body].name;
  }

  bodyReference(body: number): Reference {
    return { kind: 'body', id: this.model.bodies[body].id };
  }

  /** The name that a body gives a place; places of the ground, and others, have none. */
  nameAt(place: Place): string | null {
    if (place.body === this.model.ground) return null;
    for (const [name, p] of this.model.bodies[place.body].points)
      if (p.at === place.at) return name;
    return null;
  }

  pointReference(place: Place): Reference {
    const { id } = this.model.bodies[place.body];
    return { kind: 'point', id: `${id}.${this.nameAt(place) ?? ''}` };
  }

  /** For people: the name, with the body where another body has a point of that name elsewhere. */
  pointName(place: Place): string {
    const name = this.nameAt(place) ?? '?';
    return this.isShared(name, place) ? `${name} of the ${this.bodyName(place.body)}` : name;
  }

  pointTex(place: Place): string {
    const name = nameTex(this.nameAt(place) ?? '?');
    if (!this.isShared(this.nameAt(place) ?? '?', place)) return name;
    return `${name},${nameTex(this.bodyName(place.body))}`;
  }

  /** Whether the same name stands for a different place on another body. */
  private isShared(name: string, place: Place): boolean {
    const { state, model } = this;
    return model.bodies.some((b, i) => {
      const other = b.points.get(name);
      if (i === place.body || other === undefined) return false;
      const apart = Math.hypot(
        positionX(state, other) - positionX(state, place),
        positionY(state, other) - positionY(state, place),
      );
      return apart > 1e-3 * b.length;
    });
  }

  turn(level: Level, body: number): WorkingSymbol {
    const velocity = level === 'velocity';
    return {
      tex: `${velocity ? '\\omega' : '\\alpha'}_{${nameTex(this.bodyName(body))}}`,
      text: `angular ${level} of the ${this.bodyName(body)}`,
      unit: velocity ? 'rad/s' : 'rad/s²',
      of: this.bodyReference(body),
    };
  }

  component(level: Level, place: Place, axis: 'x' | 'y'): WorkingSymbol {
    return {
      tex: `${level === 'velocity' ? 'v' : 'a'}_{${this.pointTex(place)}${axis}}`,
      text: `${axis} component of the ${level} of ${this.pointName(place)}`,
      unit: unitOf(level),
      of: this.pointReference(place),
    };
  }

  magnitude(level: Level, place: Place): WorkingSymbol {
    return {
      tex: `|\\mathbf ${level === 'velocity' ? 'v' : 'a'}_{${this.pointTex(place)}}|`,
      text: `magnitude of the ${level} of ${this.pointName(place)}`,
      unit: unitOf(level),
      of: this.pointReference(place),
    };
  }

  direction(level: Level, place: Place): WorkingSymbol {
    return {
      tex: `\\theta_{${this.pointTex(place)}}`,
      text: `direction of the ${level} of ${this.pointName(place)}`,
      unit: 'rad',
      of: this.pointReference(place),
    };
  }

  vectorTex(level: Level, place: Place, prime = ''): string {
    return `\\mathbf ${level === 'velocity' ? 'v' : 'a'}_{${this.pointTex(place)}${prime}}`;
  }

  /** Rate along a joint, or along the line on which a known says that a point moves. */
  along(level: Level, of: Reference, what: string): WorkingSymbol {
    const name = nameTex(of.id);
    return {
      tex: level === 'velocity' ? `\\dot s_{${name}}` : `\\ddot s_{${name}}`,
      text: `${level === 'velocity' ? 'speed' : 'change of speed'} ${what}`,
      unit: unitOf(level),
      of,
    };
  }
}

const unitOf = (level: Level): Unit => (level === 'velocity' ? 'm/s' : 'm/s²');

const special = /[\\{}$&#^_%~]/g;

/** A name as KaTeX sets it: single letters in italics, the rest upright. */
export const nameTex = (name: string): string => {
  const clean = name.replace(special, (c) => (c === '_' ? '\\_' : ' '));
  return /^[A-Za-z]$/.test(clean) ? clean : `\\text{${clean}}`;
};
