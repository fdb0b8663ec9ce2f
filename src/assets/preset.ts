import { definePreset } from '@primeuix/themes'
import base from '@primeuix/themes/aura/base'
import button from '@primeuix/themes/aura/button'
import checkbox from '@primeuix/themes/aura/checkbox'
import datatable from '@primeuix/themes/aura/datatable'
import dialog from '@primeuix/themes/aura/dialog'
import drawer from '@primeuix/themes/aura/drawer'
import inputnumber from '@primeuix/themes/aura/inputnumber'
import inputtext from '@primeuix/themes/aura/inputtext'
import listbox from '@primeuix/themes/aura/listbox'
import menu from '@primeuix/themes/aura/menu'
import message from '@primeuix/themes/aura/message'
import paginator from '@primeuix/themes/aura/paginator'
import popover from '@primeuix/themes/aura/popover'
import progressbar from '@primeuix/themes/aura/progressbar'
import radiobutton from '@primeuix/themes/aura/radiobutton'
import select from '@primeuix/themes/aura/select'
import selectbutton from '@primeuix/themes/aura/selectbutton'
import tabs from '@primeuix/themes/aura/tabs'
import textarea from '@primeuix/themes/aura/textarea'
import togglebutton from '@primeuix/themes/aura/togglebutton'
import toggleswitch from '@primeuix/themes/aura/toggleswitch'
import tooltip from '@primeuix/themes/aura/tooltip'
import virtualscroller from '@primeuix/themes/aura/virtualscroller'

/** A ten-step scale of one hue, from its wash to its strongest. */
const scale = (wash: string, line: string, plain: string, strong: string) => ({
  50: wash,
  100: wash,
  200: line,
  300: line,
  400: plain,
  500: plain,
  600: plain,
  700: strong,
  800: strong,
  900: strong,
  950: strong,
})

const accent = scale('var(--accent-wash)', 'var(--accent)', 'var(--accent)', 'var(--accent-strong)')
const danger = scale('var(--danger-wash)', 'var(--danger)', 'var(--danger)', 'var(--danger-strong)')
const caution = scale('var(--caution-wash)', 'var(--caution)', 'var(--caution)', 'var(--caution)')

/**
 * The one theme of all PrimeVue components. Every colour is a variable of `tokens.css`, which knows light and dark, so
 * there is one scheme here. A component that is new to the app has to be added to the list.
 */
export const preset = definePreset(
  {
    ...base,
    components: {
      button,
      checkbox,
      datatable,
      dialog,
      drawer,
      inputnumber,
      inputtext,
      listbox,
      menu,
      message,
      paginator,
      popover,
      progressbar,
      radiobutton,
      select,
      selectbutton,
      tabs,
      textarea,
      togglebutton,
      toggleswitch,
      tooltip,
      virtualscroller,
    },
  },
  {
    primitive: {
      borderRadius: { none: '0', xs: '3px', sm: '3px', md: '3px', lg: '3px', xl: '3px' },
      red: danger,
      orange: caution,
      amber: caution,
      yellow: caution,
      green: accent,
      emerald: accent,
      teal: accent,
      sky: accent,
      blue: accent,
    },
    semantic: {
      transitionDuration: 'var(--quick)',
      focusRing: { width: '2px', style: 'solid', color: 'var(--accent)', offset: '2px', shadow: 'none' },
      primary: accent,
      formField: {
        paddingX: '0.714rem',
        paddingY: '0.5rem',
        sm: { fontSize: '0.893rem', paddingX: '0.571rem', paddingY: '0.286rem' },
        focusRing: { width: '2px', style: 'solid', color: 'var(--accent)', offset: '1px', shadow: 'none' },
      },
      list: { option: { padding: '0.429rem 0.714rem' } },
      navigation: { item: { padding: '0.5rem 0.714rem' } },
      mask: { transitionDuration: 'var(--quick)' },
      overlay: {
        select: { shadow: 'none' },
        popover: { shadow: 'none' },
        modal: { shadow: 'none', padding: '1.429rem' },
        navigation: { shadow: 'none' },
      },
      colorScheme: {
        light: {
          surface: {
            0: 'var(--card)',
            50: 'var(--sunken)',
            100: 'var(--sunken)',
            200: 'var(--hairline)',
            300: 'var(--hairline)',
            400: 'var(--edge)',
            500: 'var(--ink-soft)',
            600: 'var(--ink)',
            700: 'var(--ink)',
            800: 'var(--ink)',
            900: 'var(--ink)',
            950: 'var(--ink)',
          },
          primary: {
            color: 'var(--accent)',
            contrastColor: 'var(--on-accent)',
            hoverColor: 'var(--accent-strong)',
            activeColor: 'var(--accent-strong)',
          },
          highlight: {
            background: 'var(--accent-wash)',
            focusBackground: 'var(--accent-wash)',
            color: 'var(--ink)',
            focusColor: 'var(--ink)',
          },
          mask: { background: 'var(--veil)' },
          formField: {
            borderColor: 'var(--edge)',
            hoverBorderColor: 'var(--ink-soft)',
            invalidBorderColor: 'var(--danger)',
            disabledBackground: 'var(--sunken)',
            placeholderColor: 'var(--ink-soft)',
            invalidPlaceholderColor: 'var(--danger)',
            iconColor: 'var(--ink-soft)',
            shadow: 'none',
          },
          overlay: {
            select: { borderColor: 'var(--edge)' },
            popover: { borderColor: 'var(--edge)' },
            modal: { borderColor: 'var(--edge)' },
          },
        },
      },
    },
    components: {
      button: {
        root: { label: { fontWeight: '600' }, iconOnlyWidth: '2.571rem', sm: { iconOnlyWidth: '2rem' } },
        colorScheme: {
          light: {
            root: {
              secondary: {
                background: 'var(--card)',
                hoverBackground: 'var(--sunken)',
                activeBackground: 'var(--sunken)',
                borderColor: 'var(--edge)',
                hoverBorderColor: 'var(--ink-soft)',
                activeBorderColor: 'var(--ink-soft)',
                color: 'var(--ink)',
                hoverColor: 'var(--ink)',
                activeColor: 'var(--ink)',
                focusRing: { color: 'var(--accent)' },
              },
              danger: {
                hoverBackground: 'var(--danger-strong)',
                activeBackground: 'var(--danger-strong)',
                color: 'var(--on-danger)',
                hoverColor: 'var(--on-danger)',
                activeColor: 'var(--on-danger)',
              },
            },
            text: { secondary: { color: 'var(--ink)' } },
          },
        },
      },
      dialog: { title: { fontSize: '1.286rem' } },
      drawer: { title: { fontSize: '1.286rem' } },
      message: { text: { fontWeight: '400' } },
      menu: { root: { borderColor: 'var(--edge)' } },
      paginator: {
        root: { padding: '0.571rem 0', background: 'transparent' },
        navButton: { borderRadius: '3px', width: '2.286rem', height: '2.286rem' },
      },
      tabs: {
        tablist: { background: 'transparent' },
        tab: { padding: '0.714rem 1rem', borderWidth: '0 0 2px 0' },
        activeBar: { height: '2px' },
        tabpanel: { background: 'transparent', padding: '1.143rem 0' },
      },
      togglebutton: {
        root: { padding: '0' },
        content: { padding: '0.429rem 0.857rem', checkedShadow: 'none' },
        colorScheme: {
          light: {
            root: {
              background: 'var(--card)',
              hoverBackground: 'var(--sunken)',
              checkedBackground: 'var(--ink)',
              borderColor: 'var(--edge)',
              checkedBorderColor: 'var(--ink)',
              color: 'var(--ink)',
              checkedColor: 'var(--card)',
            },
            content: { checkedBackground: 'var(--ink)' },
            icon: { checkedColor: 'var(--card)' },
          },
        },
      },
      toggleswitch: {
        colorScheme: {
          light: {
            root: { background: 'var(--edge)', hoverBackground: 'var(--ink-soft)' },
            handle: { background: 'var(--card)', checkedBackground: 'var(--card)' },
          },
        },
      },
      tooltip: { root: { maxWidth: '22rem' } },
    },
  },
)
