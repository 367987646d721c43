import type { AriaAttributes } from 'vue'

// Strict templates know only declared props; what a component passes on to its element is allowed by name here.
declare module 'vue' {
  interface ComponentCustomProps extends AriaAttributes {
    id?: string
    title?: string
    role?: string
  }
}

export {}
