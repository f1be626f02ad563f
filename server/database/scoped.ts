import type {
  Attributes,
  CreateOptions,
  CreationAttributes,
  FindOptions,
  Model,
  ModelStatic,
  WhereOptions,
} from "sequelize";
import { NotFound } from "@server/http/errors";

/** A row that belongs to an organisation. */
export type Owned = Model & { organisationId: string };

type Where<M extends Owned> = FindOptions<Attributes<M>>;
type NewRow<M extends Owned> = Omit<CreationAttributes<M>, "organisationId">;

/**
 * The only door to rows of an organisation: everything read or written through it carries the
 * organisation's id, so a foreign id finds nothing. Raw SQL takes `organisationId` from here and
 * puts it in its WHERE clause.
 */
export interface Scope {
  readonly organisationId: string;
  /** The row with this id, or NotFound (404), be it absent or another organisation's. */
  get<M extends Owned>(
    model: ModelStatic<M>,
    id: string,
    what: string,
    options?: Where<M>,
  ): Promise<M>;
  find<M extends Owned>(model: ModelStatic<M>, options?: Where<M>): Promise<M | null>;
  list<M extends Owned>(model: ModelStatic<M>, options?: Where<M>): Promise<M[]>;
  count<M extends Owned>(model: ModelStatic<M>, options?: Where<M>): Promise<number>;
  create<M extends Owned>(
    model: ModelStatic<M>,
    values: NewRow<M>,
    options?: CreateOptions<Attributes<M>>,
  ): Promise<M>;
}

export function scoped(organisationId: string): Scope {
  function inScope<M extends Owned>(options: Where<M> = {}): Where<M> {
    // The organisation's condition comes last, so no caller can override it.
    const where = { ...(options.where as object), organisationId } as unknown as WhereOptions<
      Attributes<M>
    >;
    return { ...options, where };
  }
  return {
    organisationId,
    async get(model, id, what, options = {}) {
      const where = { ...(options.where as object), id } as unknown as WhereOptions;
      const row = await model.findOne(inScope({ ...options, where }));
      if (row === null) throw new NotFound(what);
      return row;
    },
    find: (model, options) => model.findOne(inScope(options)),
    list: (model, options) => model.findAll(inScope(options)),
    count: (model, options) => model.count(inScope(options)),
    create: <M extends Owned>(
      model: ModelStatic<M>,
      values: NewRow<M>,
      options?: CreateOptions<Attributes<M>>,
    ) => model.create({ ...values, organisationId } as unknown as CreationAttributes<M>, options),
  };
}
