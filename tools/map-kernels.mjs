// Array versions of the vec_ kernels, for tests and measurements only. A v128 cannot cross into JavaScript, so binaryen
// (a development dependency) adds to kernels.wasm one loop per kernel that applies it over memory.
import binaryen from "binaryen";

const VECTORS = 4; // in flight per iteration, as in compiled formulas

/**
 * The kernel module with a function `map_<name>(inputs, outputs, count)` for each name: addresses in bytes, `count`
 * doubles, a multiple of 8. The second argument of a kernel of two stands `count` doubles after the first.
 * With `inline`, the bodies are spliced into the loops (rare paths stay calls), as the formula emitter does.
 */
export function mapModule(bytes, names, { inline = false } = {}) {
  const module = binaryen.readBinary(bytes);
  module.setFeatures(binaryen.Features.All & ~binaryen.Features.RelaxedSIMD);
  for (const name of names) addLoop(module, name);
  if (inline) splice(module);
  if (!module.validate()) throw new Error("the mapped module is not valid");
  const binary = module.emitBinary();
  module.dispose();
  return binary;
}

function splice(module) {
  for (let i = 0; i < module.getNumExports(); i++) {
    const { name, value } = binaryen.getExportInfo(module.getExportByIndex(i));
    if (!name.endsWith("_special")) continue;
    binaryen.setPassArgument("no-inline", value);
    module.runPasses(["no-inline"]);
  }
  binaryen.setPassArgument("no-inline", null);
  binaryen.setAlwaysInlineMaxSize(4000);
  module.runPasses(["inlining-optimizing"]);
}

function addLoop(module, name) {
  const exported = binaryen.getExportInfo(module.getExport(`vec_${name}`)).value;
  const info = binaryen.getFunctionInfo(module.getFunction(exported));
  const arity = binaryen.expandType(info.params).length;
  const { i32, v128 } = binaryen;
  // locals: 0 input, 1 output, 2 bytes of one argument, 3 end of the input
  const steps = [];
  for (let u = 0; u < VECTORS; u++) {
    const args = [module.v128.load(16 * u, 8, module.local.get(0, i32))];
    const second = () => module.i32.add(module.local.get(0, i32), module.local.get(2, i32));
    if (arity === 2) args.push(module.v128.load(16 * u, 8, second()));
    steps.push(module.v128.store(16 * u, 8, module.local.get(1, i32), module.call(exported, args, v128)));
  }
  const advance = (local) =>
    module.local.set(local, module.i32.add(module.local.get(local, i32), module.i32.const(16 * VECTORS)));
  const again = module.i32.lt_u(module.local.get(0, i32), module.local.get(3, i32));
  const body = module.block(null, [
    module.local.set(2, module.i32.shl(module.local.get(2, i32), module.i32.const(3))),
    module.local.set(3, module.i32.add(module.local.get(0, i32), module.local.get(2, i32))),
    module.loop("next", module.block(null, [...steps, advance(0), advance(1), module.br("next", again)])),
  ]);
  module.addFunction(`map_${name}`, binaryen.createType([i32, i32, i32]), binaryen.none, [i32], body);
  module.addFunctionExport(`map_${name}`, `map_${name}`);
}
