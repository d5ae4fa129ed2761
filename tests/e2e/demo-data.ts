import { Product } from "./support.ts";

/** Before the first file: the demo study is made once, and every `Product` starts from a copy of it. */
export default async function makeDemoData(): Promise<() => void> {
  const product = await Product.start();
  await product.stop();
  process.env.E2E_DEMO_DATA = product.folder;
  return () => product.remove();
}
