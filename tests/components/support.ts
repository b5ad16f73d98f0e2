import { toTypedSchema } from '@vee-validate/zod'
import { mount } from '@vue/test-utils'
import { createPinia, setActivePinia } from 'pinia'
import { useForm } from 'vee-validate'
import { type Component, defineComponent, h } from 'vue'
import type { ZodTypeAny } from 'zod'

const found = import.meta.glob<{ default: Component }>('../../components/{base,form,plot}/*.vue', { eager: true })
const components = Object.fromEntries(Object.entries(found).map(([path, module]) => [path.split('/').at(-1)!.replace('.vue', ''), module.default]))
const NuxtLink = defineComponent({ props: { to: { type: String, required: true } }, setup: (props, { slots }) => () => h('a', { href: props.to }, slots.default?.()) })

/** What the page gives every component: the others by name, the store, links. */
export function globals() {
  const pinia = createPinia()
  setActivePinia(pinia)
  return { plugins: [pinia], components: { ...components, NuxtLink } }
}

/** Mounts a component by its file name. */
export function mountByName(name: string, options: { props?: Record<string, unknown>, slots?: Record<string, unknown> } = {}) {
  const component = components[name]
  if (!component) throw new Error(`no component ${name}`)
  return mount(component, { ...options, global: globals(), attachTo: document.body } as never)
}

/** Mounts fields (a template) in a form with a schema; `sent` collects what a press hands over. */
export function mountForm(template: string, schema: ZodTypeAny, initialValues: Record<string, unknown> = {}) {
  const sent: unknown[] = []
  let form: ReturnType<typeof useForm> | undefined
  const wrapper = mount(defineComponent({
    template: `<form novalidate @submit="submit">${template}<button type="submit">Send</button></form>`,
    setup() {
      form = useForm({ validationSchema: toTypedSchema(schema), initialValues })
      return { submit: form.handleSubmit(values => void sent.push(values)) }
    },
  }), { global: globals(), attachTo: document.body })
  return { wrapper, sent, form: form! }
}
