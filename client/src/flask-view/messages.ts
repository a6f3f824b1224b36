/** What the extension and the page of the Flask view say to each other. */
import type { FlaskPicture } from '../../../server/src/answers/flask-picture.ts';

export type ToPage =
  | { readonly kind: 'picture'; readonly picture: FlaskPicture; readonly file: string }
  | { readonly kind: 'nothing'; readonly why: string };

export type FromPage =
  | { readonly kind: 'ready' }
  | { readonly kind: 'copy'; readonly text: string; readonly what: string }
  | { readonly kind: 'go'; readonly line: number };
