// Stillroom theme for PrimeVue 4.5.5, on the MIT preset Nora of @primeuix/themes 2.0.3.
// Use: app.use(PrimeVue, { theme: { preset: Stillroom, options: { darkModeSelector: '.dark', cssLayer: false } } })
import { definePreset } from '@primeuix/themes';
import Nora from '@primeuix/themes/nora';

// Ramps are built around the tokens in tokens.json: ink (primary), paper (light surface), night (dark surface).
const ink = {
  50: '#EEF1F5',
  100: '#D9DFE8',
  200: '#B4BFCE',
  300: '#8998AE',
  400: '#5E708B',
  500: '#3B4D69',
  600: '#2B3B54',
  700: '#1F2C41',
  800: '#16202E',
  900: '#101824',
  950: '#0A1019',
};
const paper = {
  0: '#FFFFFF',
  50: '#FCFAF4',
  100: '#F5F1E6',
  200: '#ECE6D7',
  300: '#DCD5C3',
  400: '#AFA792',
  500: '#7E7665',
  600: '#575D68',
  700: '#3E4755',
  800: '#26303E',
  900: '#16202E',
  950: '#0C1218',
};
const night = {
  0: '#FFFFFF',
  50: '#ECE6D8',
  100: '#DAD4C6',
  200: '#C8C3B6',
  300: '#A5A399',
  400: '#7A8793',
  500: '#53606C',
  600: '#3B4854',
  700: '#2D3944',
  800: '#202B35',
  900: '#182129',
  950: '#0C1218',
};

export const Stillroom = definePreset(Nora, {
  primitive: {
    borderRadius: { none: '0', xs: '1px', sm: '2px', md: '3px', lg: '4px', xl: '6px' },
  },
  semantic: {
    transitionDuration: '0.12s',
    focusRing: { width: '2px', style: 'solid', color: '{primary.color}', offset: '2px', shadow: 'none' },
    disabledOpacity: '0.55',
    primary: ink,
    formField: {
      paddingX: '0.6rem',
      paddingY: '0.34rem',
      sm: { fontSize: '0.875rem', paddingX: '0.45rem', paddingY: '0.2rem' },
      borderRadius: '{border.radius.md}',
      focusRing: { width: '2px', style: 'solid', color: '{primary.color}', offset: '0', shadow: 'none' },
    },
    list: { padding: '0.25rem', option: { padding: '0.3rem 0.6rem', borderRadius: '{border.radius.sm}' } },
    overlay: {
      modal: {
        borderRadius: '{border.radius.lg}',
        padding: '1.25rem',
        shadow: '0 18px 50px -12px rgba(12,18,24,.42)',
      },
      select: { borderRadius: '{border.radius.md}', shadow: '0 8px 22px -8px rgba(12,18,24,.32)' },
      popover: { borderRadius: '{border.radius.md}', shadow: '0 8px 22px -8px rgba(12,18,24,.32)' },
    },
    colorScheme: {
      light: {
        surface: paper,
        primary: {
          color: '{primary.800}',
          contrastColor: '#FBF8F0',
          hoverColor: '{primary.700}',
          activeColor: '{primary.600}',
        },
        highlight: {
          background: '#F3E3D2',
          focusBackground: '#F3E3D2',
          color: '#16202E',
          focusColor: '#16202E',
        },
        text: { color: '#16202E', hoverColor: '#16202E', mutedColor: '#575D68', hoverMutedColor: '#3E4755' },
        content: {
          background: '#FCFAF4',
          hoverBackground: '#F5F1E6',
          borderColor: '#DCD5C3',
          color: '#16202E',
          hoverColor: '#16202E',
        },
        formField: {
          background: '#FFFFFF',
          disabledBackground: '#ECE6D7',
          filledBackground: '#F5F1E6',
          borderColor: '#7E7665',
          hoverBorderColor: '#575D68',
          focusBorderColor: '#16202E',
          invalidBorderColor: '#B23A2E',
          color: '#16202E',
          placeholderColor: '#575D68',
          invalidPlaceholderColor: '#96271D',
          iconColor: '#575D68',
        },
        overlay: {
          modal: { background: '#FCFAF4', borderColor: '#7E7665', color: '#16202E' },
          select: { background: '#FFFFFF', borderColor: '#7E7665', color: '#16202E' },
          popover: { background: '#FFFFFF', borderColor: '#7E7665', color: '#16202E' },
        },
        mask: { background: 'rgba(22,32,46,.24)', color: '#16202E' },
      },
      dark: {
        surface: night,
        primary: {
          color: '#ECE6D8',
          contrastColor: '#131B22',
          hoverColor: '#FFFFFF',
          activeColor: '#C8C3B6',
        },
        highlight: {
          background: '#3A2A1E',
          focusBackground: '#3A2A1E',
          color: '#ECE6D8',
          focusColor: '#ECE6D8',
        },
        text: { color: '#ECE6D8', hoverColor: '#FFFFFF', mutedColor: '#A5A399', hoverMutedColor: '#C8C3B6' },
        content: {
          background: '#182129',
          hoverBackground: '#202B35',
          borderColor: '#2D3944',
          color: '#ECE6D8',
          hoverColor: '#FFFFFF',
        },
        formField: {
          background: '#0F161C',
          disabledBackground: '#202B35',
          filledBackground: '#131B22',
          borderColor: '#7A8793',
          hoverBorderColor: '#A5A399',
          focusBorderColor: '#ECE6D8',
          invalidBorderColor: '#E0705F',
          color: '#ECE6D8',
          placeholderColor: '#A5A399',
          invalidPlaceholderColor: '#F59A8B',
          iconColor: '#A5A399',
        },
        overlay: {
          modal: { background: '#182129', borderColor: '#7A8793', color: '#ECE6D8' },
          select: { background: '#202B35', borderColor: '#7A8793', color: '#ECE6D8' },
          popover: { background: '#202B35', borderColor: '#7A8793', color: '#ECE6D8' },
        },
        mask: { background: 'rgba(4,8,12,.6)', color: '#ECE6D8' },
      },
    },
  },
  components: {
    button: {
      root: {
        borderRadius: '{border.radius.md}',
        paddingX: '0.85rem',
        paddingY: '0.34rem',
        gap: '0.4rem',
        label: { fontWeight: '500' },
        sm: { fontSize: '0.875rem', paddingX: '0.6rem', paddingY: '0.18rem' },
      },
    },
    datatable: {
      headerCell: {
        padding: '0.35rem 0.7rem',
        background: 'transparent',
        color: '{text.muted.color}',
        borderColor: '{content.border.color}',
      },
      columnTitle: { fontWeight: '500' },
      bodyCell: { padding: '0.5rem 0.7rem', borderColor: '{content.border.color}' },
      row: { background: 'transparent', hoverBackground: '{content.hover.background}' },
    },
    dialog: { title: { fontSize: '1.375rem', fontWeight: '400' } },
    toggleswitch: { root: { width: '2.1rem', height: '1.2rem' }, handle: { size: '0.8rem' } },
    tooltip: {
      root: {
        background: '{surface.900}',
        color: '{surface.50}',
        padding: '0.3rem 0.55rem',
        borderRadius: '{border.radius.sm}',
      },
    },
    checkbox: { root: { borderRadius: '{border.radius.sm}', width: '1.05rem', height: '1.05rem' } },
  },
});
export default Stillroom;
