/** The flask of the line under the cursor, for a client that draws it. */
import { type FlaskPicture, flaskPictureAt } from '../../answers/flask-picture.ts';
import { answering, type Session } from '../session.ts';

/** Parameters as those of a hover; null where there is no flask. */
export const FLASK_AT = 'lyate/flaskAt';

interface FlaskAtParams {
  readonly textDocument: { readonly uri: string };
  readonly position: { readonly line: number; readonly character: number };
}

export function registerFlaskAt(session: Session): void {
  session.connection.onRequest(
    FLASK_AT,
    answering<FlaskAtParams, FlaskPicture | null>(session, null, ({ analysed }, { position }) =>
      flaskPictureAt(analysed, position.line),
    ),
  );
}
