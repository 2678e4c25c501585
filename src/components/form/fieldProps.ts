/** What every field takes: its words, what is wrong with it (already in words), and whether it may be left empty. */
export interface FieldProps {
  label: string;
  help?: string;
  violation?: string | null;
  optional?: boolean;
  disabled?: boolean;
  autofocus?: boolean;
}
