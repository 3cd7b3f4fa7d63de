import { definePreset } from '@primeuix/themes'
import Aura from '@primeuix/themes/aura'

/** Oxidised to bright copper; 700 carries text on paper and on the table (contrast at least 4.5). */
const copper = {
  50: '#fbf3ec',
  100: '#f4e0d0',
  200: '#e7c0a3',
  300: '#d69b72',
  400: '#c27a4a',
  500: '#a95c2c',
  600: '#9c4e20',
  700: '#8f4318',
  800: '#703412',
  900: '#52260d',
  950: '#351808',
}

/** Ink on a cool grey table. 0 is paper. */
const ink = {
  0: '#fdfdfb',
  50: '#f4f6f6',
  100: '#e9edee',
  200: '#d6dcdf',
  300: '#bac3c8',
  400: '#8b979e',
  500: '#66737b',
  600: '#4b575f',
  700: '#35404a',
  800: '#252f36',
  900: '#1b2328',
  950: '#10161a',
}

const square = '0'
const focusRing = { width: '2px', style: 'solid', color: '{primary.700}', offset: '2px', shadow: 'none' }
const verdict = (color: string, hover: string) => ({
  background: color,
  hoverBackground: hover,
  activeBackground: hover,
  borderColor: color,
  hoverBorderColor: hover,
  activeBorderColor: hover,
  color: ink[0],
  hoverColor: ink[0],
  activeColor: ink[0],
  focusRing: { color: '{primary.700}', shadow: 'none' },
})
const message = (background: string, color: string) => ({ background, borderColor: color, color, shadow: 'none' })

export const preset = definePreset(Aura, {
  primitive: { borderRadius: { none: square, xs: square, sm: square, md: square, lg: square, xl: square } },
  semantic: {
    transitionDuration: '0s',
    focusRing,
    disabledOpacity: '1',
    primary: copper,
    formField: {
      paddingX: '0.625rem',
      paddingY: '0.4375rem',
      borderRadius: square,
      transitionDuration: '0s',
      focusRing: { width: '2px', style: 'solid', color: '{primary.700}', offset: '0', shadow: 'none' },
    },
    overlay: {
      select: { borderRadius: square, shadow: '3px 3px 0 rgb(27 35 40 / 18%)' },
      popover: { borderRadius: square, shadow: '3px 3px 0 rgb(27 35 40 / 18%)' },
      modal: { borderRadius: square, padding: '1.5rem', shadow: '6px 6px 0 rgb(27 35 40 / 25%)' },
      navigation: { shadow: '3px 3px 0 rgb(27 35 40 / 18%)' },
    },
    colorScheme: {
      light: {
        surface: ink,
        primary: { color: '{primary.700}', contrastColor: ink[0], hoverColor: '{primary.800}', activeColor: '{primary.900}' },
        highlight: { background: '{primary.100}', focusBackground: '{primary.200}', color: ink[900], focusColor: ink[900] },
        mask: { background: 'rgb(27 35 40 / 45%)', color: ink[0] },
        formField: {
          background: '#ffffff',
          disabledBackground: ink[100],
          borderColor: ink[500],
          hoverBorderColor: ink[700],
          focusBorderColor: '{primary.700}',
          invalidBorderColor: '#a0222a',
          color: ink[900],
          disabledColor: ink[600],
          placeholderColor: ink[500],
          invalidPlaceholderColor: ink[500],
          iconColor: ink[600],
          shadow: 'none',
        },
        text: { color: ink[900], hoverColor: ink[950], mutedColor: ink[600], hoverMutedColor: ink[700] },
        content: { background: ink[0], hoverBackground: ink[50], borderColor: ink[300], color: ink[900], hoverColor: ink[950] },
        overlay: {
          select: { background: '#ffffff', borderColor: ink[700], color: ink[900] },
          popover: { background: '#ffffff', borderColor: ink[700], color: ink[900] },
          modal: { background: ink[0], borderColor: ink[900], color: ink[900] },
        },
      },
    },
  },
  components: {
    button: {
      root: { label: { fontWeight: '500' }, paddingX: '0.875rem', roundedBorderRadius: square },
      colorScheme: {
        light: {
          root: {
            secondary: {
              background: '#ffffff',
              hoverBackground: ink[100],
              activeBackground: ink[200],
              borderColor: ink[600],
              hoverBorderColor: ink[900],
              activeBorderColor: ink[900],
              color: ink[900],
              hoverColor: ink[950],
              activeColor: ink[950],
              focusRing: { color: '{primary.700}', shadow: 'none' },
            },
            danger: verdict('#a0222a', '#7c171e'),
          },
        },
      },
    },
    // The chosen one is filled, the others are ringed: the polarity dot.
    radiobutton: {
      root: {
        checkedBackground: '#ffffff',
        checkedHoverBackground: '#ffffff',
        checkedBorderColor: '{primary.700}',
        checkedHoverBorderColor: '{primary.800}',
      },
      icon: { size: '0.75rem', checkedColor: '{primary.700}', checkedHoverColor: '{primary.800}' },
    },
    datatable: {
      headerCell: { background: ink[0], hoverBackground: ink[100], borderColor: ink[900], padding: '0.5rem 0.75rem' },
      bodyCell: { borderColor: ink[300], padding: '0.5rem 0.75rem' },
      columnTitle: { fontWeight: '500' },
      colorScheme: { light: { root: { borderColor: ink[300] } } },
    },
    message: {
      colorScheme: {
        light: {
          info: message(ink[50], ink[800]),
          success: message('#edf5f0', '#17573a'),
          warn: message('#fbf4e2', '#6f4a00'),
          error: message('#faeeee', '#8a1c24'),
          secondary: message(ink[50], ink[800]),
        },
      },
    },
  },
})
