declare module '#app' {
  interface PageMeta {
    /** The name of a field page in its bar. A page that knows more calls `useFieldHeading`. */
    heading?: string
    /** Where "Back" of a field page leads. */
    back?: string
    /** `false` hides the field's bottom bar. */
    fieldNav?: boolean
  }
}

export {}
