import { analyseScan } from "#core/onsets/index.js";
import { test } from "vitest";
function rng(seed: number){ let s=seed>>>0; return ()=>{ s=(s+0x6d2b79f5)>>>0; let t=s; t=Math.imul(t^(t>>>15),t|1); t^=t+Math.imul(t^(t>>>7),t|61); return ((t^(t>>>14))>>>0)/4294967296; }; }
function gauss(r: ()=>number){ return Math.sqrt(-2*Math.log(1-r()))*Math.cos(2*Math.PI*r()); }
function scan(seed: number, TN: number, beta: number, I0: number, B: number, step: number, noise: (i:number)=>number, to: number, from=2){
  const r=rng(seed); const T: number[]=[], v: number[]=[], su: number[]=[];
  for(let t=from;t<=to+1e-9;t+=step){ const i=(t<TN?I0*(1-t/TN)**(2*beta):0)+B; const s=noise(i); T.push(t); v.push(i+s*gauss(r)); su.push(s);} return {T,v,su};
}
test("coverage", {timeout:100000}, ()=>{
  for (const mode of ["I0","prop","nosu","propnosu"]) {
  let inT=0, inB=0, n=0, none=0; const t0=performance.now(); let w=0, zs=0, zb=0;
  for(let s=0;s<40;s++){ const r=rng(1000+s); const TN=20+60*r(), beta=0.125+0.375*r(), step=TN*(0.01+0.02*r());
    const noise=(i:number)=> mode.startsWith("prop")? Math.max(0.02*i, 0.1) : 2;
    const d=scan(5000+s,TN,beta,100,10*r()+1,step,noise,1.3*TN);
    const a=analyseScan([{name:"a",temperatures:d.T,values:d.v,uncertainties:mode.endsWith("nosu")?null:d.su}]);
    const f=a.peaks[0]!.fit; if(!f){none++; continue;} n++; w+=f.reducedRange;
    const zT=(f.transition.value-TN)/(f.transition.su??NaN), zB=(f.beta.value-beta)/(f.beta.su??NaN); zs+=zT*zT; zb+=zB*zB;
    if(Math.abs(zT)<=2.5) inT++; else console.log(mode,s,"T",TN,f.transition,step,beta); if(Math.abs(zB)<=2.5) inB++; else console.log(mode,s,"B",beta,f.beta);
  }
  console.log(mode, {n,none,inT,inB, range:(w/n).toFixed(2), zT:Math.sqrt(zs/n), zB:Math.sqrt(zb/n), ms:(performance.now()-t0).toFixed(0)});
  }
});
test("two", ()=>{
  let two=0, one=0; const t0=performance.now();
  for(let s=0;s<20;s++){ 
    const mk=(seed: number,TN: number,beta: number)=>{ const d=scan(seed,TN,beta,100,5,0.25,()=>2,48,30); return {name:"x",temperatures:d.T,values:d.v,uncertainties:d.su}; };
    const a=analyseScan([mk(s*10+1,40,0.3),mk(s*10+2,40,0.35),mk(s*10+3,42,0.3)]);
    if(a.transitions.length===2 && a.transitions[0]!.series.join()==="0,1") two++; else console.log(JSON.stringify(a.transitions));
    const b=analyseScan([mk(s*10+4,40,0.3),mk(s*10+5,40,0.35),mk(s*10+6,40,0.3)]);
    if(b.transitions.length===1) one++; else console.log(JSON.stringify(b.transitions), b.peaks.map(p=>p.fit?.transition));
  }
  console.log({two,one,ms:performance.now()-t0});
}, 60000);
