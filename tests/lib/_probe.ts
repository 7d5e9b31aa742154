import { findOrbit } from "../../lib/orbit/find_orbit.ts";
import { Transient } from "../../lib/orbit/transient.ts";
import { ChargeCoordinates } from "../../lib/orbit/charge_coordinates.ts";
import { gaussMethod } from "../../lib/numeric/gauss.ts";
import { stuartLandau } from "./orbit/_systems.ts";
const {system}=stuartLandau({ growth: -0.3, frequency: 2, damping: 1, shear: 0 });
const start=Float64Array.of(1,0);
const c=new ChargeCoordinates(system,start);
const t=new Transient(c,gaussMethod(3),{start,charges:start.slice(),firstStep:1e-2/2,longestStep:Infinity});
for(let i=0;i<20;i++){const o=t.nextCycle(80000);console.log(o.status, o.status==="closed"?[o.path.mesh.length,o.size,o.growth,o.path.period, o.path.mesh[1]]:o);if(o.status!=="closed")break}
try{console.log(findOrbit(system,{start}))}catch(e){console.log(e)}
