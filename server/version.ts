import packageFile from '../package.json' with { type: 'json' }

/** Version of the product, as package.json has it. */
export const PRODUCT_VERSION: string = packageFile.version
