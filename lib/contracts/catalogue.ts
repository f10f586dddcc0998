import { z } from 'zod';
import { ALLERGENS, INGREDIENT_KINDS, NITROGEN_NEEDS, PRESERVATIVES } from '../core/must/ingredients';
import { HOW_STATUSES } from '../core/how/how';
import { id, line, text } from './common';
import { rangeWithin } from './figures';

const share = rangeWithin(0, 1);

/** An ingredient as a must sheet keeps it: a sheet never changes because the catalogue did. */
export const ingredientSchema = z.object({
  key: z.string().regex(/^[a-z0-9-]{1,60}$/, 'is not a key of the catalogue'),
  name: line(80),
  kind: z.enum(INGREDIENT_KINDS, 'choose what it is'),
  extract_share: share,
  insoluble_share: z.number().min(0).max(1),
  fermentable_share: share,
  density_g_per_ml: rangeWithin(0.01, 5).nullable(),
  each: z.object({ name: line(30), grams: rangeWithin(0.01, 100_000) }).nullable(),
  releases_over_days: rangeWithin(0, 365).nullable(),
  yan_mg_per_g: rangeWithin(0, 1000),
  sulphite_mg_per_g: rangeWithin(0, 1000),
  allergens: z.array(z.enum(ALLERGENS)).max(ALLERGENS.length),
  preservative: z.enum(PRESERVATIVES).nullable(),
  mash: z.object({ efficiency: share, absorbs_l_per_kg: z.number().min(0).max(5) }).nullable(),
  usual_g_per_l: rangeWithin(0, 1000).nullable(),
  caution: text(300).nullable(),
  source: line(300),
  status: z.enum(HOW_STATUSES),
});
export type IngredientBody = z.infer<typeof ingredientSchema>;

const yeastFields = {
  name: line(80),
  /** Apparent attenuation in wort, as fractions; null for yeasts that take all the sugar. */
  attenuation: rangeWithin(0.2, 1.3).nullable(),
  tolerance_abv: rangeWithin(1, 25),
  temperature_c: z
    .object({ min: z.number().min(-5).max(45), max: z.number().min(-5).max(45) })
    .refine((range) => range.min <= range.max, { path: ['max'], message: 'must not be below the lower end' }),
  nitrogen_need: z.enum(NITROGEN_NEEDS),
  diastatic: z.boolean(),
};

export const yeastSchema = z.object({ ...yeastFields, status: z.enum(HOW_STATUSES) });
export type YeastBody = z.infer<typeof yeastSchema>;

const own = { id: id.nullable() };

/** `GET /api/v1/catalogue`: what the program knows, and what the cellar added (those have an `id`). */
export const catalogueSchema = z.object({
  ingredients: z.array(ingredientSchema.extend(own)),
  yeasts: z.array(yeastSchema.extend(own)),
});
export type CatalogueBody = z.infer<typeof catalogueSchema>;

/** The key, source and status of the cellar's own are the program's to set. */
export const ingredientForm = ingredientSchema
  .omit({ key: true, source: true, status: true })
  .refine((item) => item.extract_share.hi + item.insoluble_share <= 1 + 1e-9, { path: ['insoluble_share'], message: 'with the sugar it is more than the whole' });
export type IngredientForm = z.infer<typeof ingredientForm>;
export const yeastForm = z.object(yeastFields);
export type YeastForm = z.infer<typeof yeastForm>;

/** `POST /api/v1/catalogue`, `PATCH /api/v1/catalogue/{id}`. */
export const catalogueForm = z.discriminatedUnion('sort', [z.object({ sort: z.literal('ingredient'), ingredient: ingredientForm }), z.object({ sort: z.literal('yeast'), yeast: yeastForm })]);
export type CatalogueForm = z.infer<typeof catalogueForm>;

export const catalogueItem = z.discriminatedUnion('sort', [
  z.object({ sort: z.literal('ingredient'), ingredient: ingredientSchema.extend({ id }) }),
  z.object({ sort: z.literal('yeast'), yeast: yeastSchema.extend({ id }) }),
]);
export type CatalogueItem = z.infer<typeof catalogueItem>;
