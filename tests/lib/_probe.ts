import { orbitOf, tanhOscillator, unitSource, vanDerPol } from "./orbit/_systems.ts";
import { phaseDiffusion } from "../../lib/orbit/phase_diffusion.ts";
const row={quality:2,gain:3};
const {quality,gain}=row;
const src=[{label:"",device:"",color:"white" as const,inject(_x:Float64Array,i:Float64Array){i[0]=Math.sqrt(1/quality);i[1]=0}},{label:"",device:"",color:"white" as const,inject(x:Float64Array,i:Float64Array){i[0]=Math.sqrt(gain/quality)/Math.cosh(x[0]!);i[1]=0}}];
const ex=tanhOscillator(row);
for(const o of [{}, { tolerance: 1e-13 },{tolerance:1e-12}, { tolerance: 1e-13, steps: 40, stages: 2 },{ tolerance: 1e-13, steps: 40, stages: 3 },{ tolerance: 1e-13, steps: 24, stages: 4 }]){
 const orbit=orbitOf(ex.system,{start:ex.start,...o});
 const {sources:[a,b]}=phaseDiffusion(orbit,src);
 console.log(o,orbit.steps,b!.diffusion/a!.diffusion-1,orbit.residual,orbit.discrete.adjoint.closure,orbit.work, Math.hypot(...orbit.multipliers.map(m=>m.re-1)),orbit.multipliers[0]);
}
