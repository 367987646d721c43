import { definePreset } from '@primeuix/themes'
import Aura from '@primeuix/themes/aura'

/*
 * PrimeVue in Fanflower's identity. Every colour is one of the custom properties of base.css, which alone knows the
 * light and the dark values; corners come from the working hand (--round-control, --round-sheet).
 */

/** A palette for a tone whose fill, wash and text-on-fill are known: Aura asks for eleven steps. */
const tone = (name: string) => {
  const fill = `var(--${name})`
  const wash = `var(--${name}-wash)`
  return {
    50: wash,
    100: wash,
    200: wash,
    300: fill,
    400: fill,
    500: fill,
    600: fill,
    700: fill,
    800: fill,
    900: wash,
    950: 'var(--on-fill)',
  }
}

const lightSurface = {
  0: 'var(--sheet)',
  50: 'var(--paper)',
  100: 'var(--wash)',
  200: 'var(--line-soft)',
  300: 'var(--line)',
  400: 'var(--line)',
  500: 'var(--ink-soft)',
  600: 'var(--ink-soft)',
  700: 'var(--ink)',
  800: 'var(--ink)',
  900: 'var(--ink)',
  950: 'var(--ink)',
}

// In its dark scheme Aura reads the same scale from the other end.
const darkSurface = {
  0: 'var(--ink)',
  50: 'var(--ink)',
  100: 'var(--ink)',
  200: 'var(--ink)',
  300: 'var(--ink-soft)',
  400: 'var(--ink-soft)',
  500: 'var(--line)',
  600: 'var(--line)',
  700: 'var(--line-soft)',
  800: 'var(--wash)',
  900: 'var(--sheet)',
  950: 'var(--paper)',
}

const overlay = { background: 'var(--sheet)', borderColor: 'var(--line-soft)', color: 'var(--ink)' }
const itemIcon = { color: 'var(--ink-soft)', focusColor: 'var(--ink)', activeColor: 'var(--petal)' }

const scheme = {
  primary: {
    color: 'var(--petal)',
    contrastColor: 'var(--on-fill)',
    hoverColor: 'var(--petal-deep)',
    activeColor: 'var(--petal-deep)',
  },
  highlight: {
    background: 'var(--petal-wash)',
    focusBackground: 'var(--petal-wash)',
    color: 'var(--petal)',
    focusColor: 'var(--petal)',
  },
  mask: { background: 'var(--veil)', color: 'var(--ink)' },
  formField: {
    background: 'var(--sheet)',
    disabledBackground: 'var(--wash)',
    filledBackground: 'var(--sheet)',
    filledHoverBackground: 'var(--sheet)',
    filledFocusBackground: 'var(--sheet)',
    borderColor: 'var(--line)',
    hoverBorderColor: 'var(--ink-soft)',
    focusBorderColor: 'var(--petal)',
    invalidBorderColor: 'var(--clay)',
    color: 'var(--ink)',
    disabledColor: 'var(--ink-soft)',
    placeholderColor: 'var(--ink-soft)',
    invalidPlaceholderColor: 'var(--clay)',
    floatLabelColor: 'var(--ink-soft)',
    floatLabelFocusColor: 'var(--petal)',
    floatLabelActiveColor: 'var(--ink-soft)',
    floatLabelInvalidColor: 'var(--clay)',
    iconColor: 'var(--ink-soft)',
    shadow: 'none',
  },
  text: {
    color: 'var(--ink)',
    hoverColor: 'var(--ink)',
    mutedColor: 'var(--ink-soft)',
    hoverMutedColor: 'var(--ink)',
  },
  content: {
    background: 'var(--sheet)',
    hoverBackground: 'var(--wash)',
    borderColor: 'var(--line-soft)',
    color: 'var(--ink)',
    hoverColor: 'var(--ink)',
  },
  overlay: { select: overlay, popover: overlay, modal: overlay },
  list: {
    option: {
      focusBackground: 'var(--wash)',
      selectedBackground: 'var(--petal-wash)',
      selectedFocusBackground: 'var(--petal-wash)',
      color: 'var(--ink)',
      focusColor: 'var(--ink)',
      selectedColor: 'var(--petal)',
      selectedFocusColor: 'var(--petal)',
      icon: itemIcon,
    },
    optionGroup: { background: 'transparent', color: 'var(--ink-soft)' },
  },
  navigation: {
    item: {
      focusBackground: 'var(--wash)',
      activeBackground: 'var(--petal-wash)',
      color: 'var(--ink)',
      focusColor: 'var(--ink)',
      activeColor: 'var(--petal)',
      icon: itemIcon,
    },
  },
}

const focusRing = { width: '3px', style: 'solid', color: 'var(--focus)', offset: '2px', shadow: 'none' }

const quiet = {
  background: 'var(--petal-wash)',
  hoverBackground: 'var(--petal-wash)',
  activeBackground: 'var(--petal-wash)',
  borderColor: 'var(--petal-wash)',
  hoverBorderColor: 'var(--petal)',
  activeBorderColor: 'var(--petal)',
  color: 'var(--petal)',
  hoverColor: 'var(--petal-deep)',
  activeColor: 'var(--petal-deep)',
  focusRing: { color: 'var(--focus)', shadow: 'none' },
}

const bare = {
  primary: {
    hoverBackground: 'var(--petal-wash)',
    activeBackground: 'var(--petal-wash)',
    color: 'var(--petal)',
  },
  secondary: { hoverBackground: 'var(--wash)', activeBackground: 'var(--wash)', color: 'var(--ink)' },
  danger: { hoverBackground: 'var(--clay-wash)', activeBackground: 'var(--clay-wash)', color: 'var(--clay)' },
}

const outlined = {
  primary: { ...bare.primary, borderColor: 'var(--petal)' },
  secondary: { ...bare.secondary, borderColor: 'var(--line)' },
  danger: { ...bare.danger, borderColor: 'var(--clay)' },
}

const buttonScheme = { root: { secondary: quiet }, outlined, text: bare }
const tableScheme = {
  root: { borderColor: 'var(--line-soft)' },
  row: { stripedBackground: 'var(--paper)' },
  bodyCell: { selectedBorderColor: 'var(--petal)' },
}

export const theme = definePreset(Aura, {
  primitive: {
    red: tone('clay'),
    green: tone('leaf'),
    emerald: tone('leaf'),
    sky: tone('rain'),
    blue: tone('rain'),
    orange: tone('pollen'),
    amber: tone('pollen'),
    yellow: tone('pollen'),
    purple: tone('petal'),
  },
  semantic: {
    transitionDuration: '0.15s',
    focusRing,
    primary: {
      50: 'var(--petal-wash)',
      100: 'var(--petal-wash)',
      200: 'var(--petal-wash)',
      300: 'var(--petal)',
      400: 'var(--petal)',
      500: 'var(--petal)',
      600: 'var(--petal-deep)',
      700: 'var(--petal-deep)',
      800: 'var(--petal-deep)',
      900: 'var(--petal-deep)',
      950: 'var(--petal-deep)',
    },
    formField: {
      paddingX: '0.75rem',
      paddingY: '0.5625rem',
      borderRadius: 'var(--round-control)',
      focusRing: { ...focusRing, offset: '1px' },
    },
    content: { borderRadius: 'var(--round-control)' },
    list: { option: { padding: '0.5625rem 0.75rem', borderRadius: 'var(--round-control)' } },
    navigation: { item: { borderRadius: 'var(--round-control)' } },
    overlay: {
      select: { borderRadius: 'var(--round-control)', shadow: 'var(--shadow-raised)' },
      popover: { borderRadius: 'var(--round-control)', shadow: 'var(--shadow-raised)' },
      modal: { borderRadius: 'var(--round-sheet)', padding: '1.5rem', shadow: 'var(--shadow-raised)' },
    },
    colorScheme: {
      light: { surface: lightSurface, ...scheme },
      dark: { surface: darkSurface, ...scheme },
    },
  },
  components: {
    button: {
      root: {
        borderRadius: 'var(--round-control)',
        label: { fontWeight: '600' },
        paddingY: '0.5625rem',
        paddingX: '1rem',
      },
      colorScheme: { light: buttonScheme, dark: buttonScheme },
    },
    datatable: {
      headerCell: { padding: '0.5rem', gap: '0.25rem', background: 'transparent', color: 'var(--ink-soft)' },
      bodyCell: { padding: '0.5rem' },
      sortIcon: { size: '0.75rem' },
      row: { background: 'transparent' },
      colorScheme: { light: tableScheme, dark: tableScheme },
    },
    checkbox: { root: { width: '1.5rem', height: '1.5rem' } },
    radiobutton: { root: { width: '1.5rem', height: '1.5rem' } },
    tag: { root: { borderRadius: 'var(--round-control)', fontWeight: '600' } },
    paginator: { root: { background: 'transparent', padding: '0.5rem 0' } },
  },
})

/** British English, the week from Monday, days as '3 Mar 2026'. */
export const locale = {
  firstDayOfWeek: 1,
  dateFormat: 'd M yy',
  dayNames: ['Sunday', 'Monday', 'Tuesday', 'Wednesday', 'Thursday', 'Friday', 'Saturday'],
  dayNamesShort: ['Sun', 'Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat'],
  dayNamesMin: ['Su', 'Mo', 'Tu', 'We', 'Th', 'Fr', 'Sa'],
  monthNames: [
    ...['January', 'February', 'March', 'April', 'May', 'June'],
    ...['July', 'August', 'September', 'October', 'November', 'December'],
  ],
  monthNamesShort: ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'],
  today: 'Today',
  clear: 'Clear',
  choose: 'Choose',
  upload: 'Upload',
  cancel: 'Cancel',
  accept: 'Yes',
  reject: 'No',
  emptyMessage: 'Nothing to choose from',
  emptyFilterMessage: 'Nothing fits this search',
  emptySelectionMessage: 'Nothing chosen',
  emptySearchMessage: 'Nothing fits this search',
}
