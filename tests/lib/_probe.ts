import { odeSystem, findOrbit, phaseSensitivity, phaseDiffusion, findEquilibrium, Orbit } from "../../lib/orbit/mod.ts";
const vdp=(mu:number)=>odeSystem({dimension:2,flow:(x,into)=>{into[0]=x[1]!;into[1]=mu*(1-x[0]!**2)*x[1]!-x[0]!},jacobian:(x,J)=>{J[0]=0;J[1]=1;J[2]=-2*mu*x[0]!*x[1]!-1;J[3]=mu*(1-x[0]!**2)}});
const T:any={0.1:6.287111272288726806053944390407158,1:6.663286859323130189699682030482329,5:11.61223066771957003455506622973852,10:19.07836956693901407043011282581517};
const L:any={0.1:-0.6291039210260195955762269775887443,1:-7.058932808798959179022184303002,5:-85.45201854488354065129827247279663,10:-311.8442192862280184918581031038136};
const c:any={0.1:.12542928739532613,1:.16307174680182884,5:0.3110346441650133,10:NaN};
for(const mu of [0.1,1,5,10]) for (const tolerance of [1e-8,1e-12]) for(const stages of [3,4]){
  const sys=vdp(mu); const t0=performance.now();
  const o=findOrbit(sys,{start:Float64Array.of(2,0),tolerance,stages});
  if(!(o instanceof Orbit)){console.log(mu,tolerance,o.status,o.reason);continue}
  const v=phaseSensitivity(o);
  const d=phaseDiffusion(v,[{label:"y",device:"",color:"white",inject(_x,i){i[0]=0;i[1]=Math.SQRT2}}]);
  let dev=0; for(let k=0;k<300;k++){const t=k*o.period/300+0.0123;const x=o.at(t);const w=v.at(t);const f=[x[1]!,mu*(1-x[0]!**2)*x[1]!-x[0]!];dev=Math.max(dev,Math.abs(w[0]!*f[0]!+w[1]!*f[1]!-1))}
  console.log(mu,tolerance,stages,o.steps,"T",o.period/T[mu]-1,"est",o.estimate.period,o.estimate.sensitivity,"dev",dev,"lnF",o.exponents[1]!.re*o.period/L[mu]-1,"c",d.total/c[mu]-1,"ms",(performance.now()-t0).toFixed(0),o.exponents[0]);
}
