import type { en } from './en';

export type TextKey = keyof typeof en;

/** All texts of one language. A translation is `export const xx: Catalogue = { … }`: a text left out is a type error. */
export type Catalogue = Readonly<Record<TextKey, string>>;

/** What a text of that key is given: `[]` where it takes nothing. Read off the English text's braces, so that one forgotten or misspelt is a type error. */
export type Given<Key extends TextKey> = keyof In<(typeof en)[Key]> extends never ? [] : [values: Shown<In<(typeof en)[Key]>>];

type Shown<Values> = { [Name in keyof Values]: Values[Name] };
type In<Text extends string> = InText<Text, [], unknown>;
/** What kind of value `{name, kind, …}` wants; a bare `{name}` takes words or a number. */
type Of<Kind extends string> = Kind extends ' plural' | ' selectordinal' ? number : string;

// A text is prose with arguments; an argument of a kind holds branches, each a text again. `Open` counts the branches that are open.
type InText<Text extends string, Open extends 0[], Found> = Text extends `${infer Prose}{${infer After}`
  ? Prose extends `${string}}${string}`
    ? BranchEnds<Text, Open, Found>
    : InArgument<After, Open, Found>
  : BranchEnds<Text, Open, Found>;

type BranchEnds<Text extends string, Open extends 0[], Found> = Text extends `${string}}${infer After}` ? (Open extends [0, ...infer Outer extends 0[]] ? InBranches<After, Outer, Found> : Found) : Found;

type InArgument<Text extends string, Open extends 0[], Found> = Text extends `${infer Head}}${infer After}`
  ? Head extends `${infer Name},${infer Kind},${string}`
    ? Text extends `${string},${string},${infer Branches}`
      ? InBranches<Branches, Open, Found & Record<Name, Of<Kind>>>
      : Found
    : InText<After, Open, Found & Record<Head, string | number>>
  : Found;

type InBranches<Text extends string, Open extends 0[], Found> = Text extends `${infer Between}{${infer Branch}`
  ? Between extends `${string}}${string}`
    ? ArgumentEnds<Text, Open, Found>
    : InText<Branch, [0, ...Open], Found>
  : ArgumentEnds<Text, Open, Found>;

type ArgumentEnds<Text extends string, Open extends 0[], Found> = Text extends `${string}}${infer After}` ? InText<After, Open, Found> : Found;
