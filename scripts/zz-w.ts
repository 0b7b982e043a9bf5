import {readFileSync} from 'node:fs';
import {describeCube} from '@/shared/fits/cubeHead';
import {buildWcs} from '@/shared/sky/wcs';
import {separation} from '@/shared/sky/greatCircle';
const w=JSON.parse(readFileSync('/work/shared/reference/wcs-vectors.json','utf8'));
for (const h of w.headers) {
  try {
  const text=h.cards.join('').padEnd(Math.ceil(h.cards.length/36)*2880);
  const head=describeCube(new TextEncoder().encode(text));
  const wcs=buildWcs(JSON.parse(JSON.stringify(head.wcs)));
  let sky=0,gal=0,vel=0,freq=0,inv=0,nul=0;
  for(const p of h.pixels){
    const s=wcs.pixelToSky(p.x,p.y), g=wcs.pixelToGalactic(p.x,p.y);
    if((s===null)!==(p.lon===null)) {nul++; continue}
    if(s){ sky=Math.max(sky,separation(s,p)); gal=Math.max(gal,separation({lon:g!.l,lat:g!.b},{lon:p.l,lat:p.b}));
     const back=wcs.skyToPixel(s.lon,s.lat); if(!back) nul++; else inv=Math.max(inv,Math.hypot(back.x-p.x,back.y-p.y));
    }
    vel=Math.max(vel,Math.abs(wcs.velocityOf(p.channel)-p.velocity));
    const f=wcs.frequencyHzOf(p.channel); if((f===null)!==(p.frequencyHz===null)) nul++; else if(f!==null) freq=Math.max(freq,Math.abs(f/p.frequencyHz-1));
  }
  for(const q of h.inverse){ const r=wcs.galacticToPixel(q.l,q.b); if((r===null)!==(q.x===null)) nul++; else if(r) inv=Math.max(inv,Math.hypot(r.x-q.x,r.y-q.y)); inv=Math.max(inv,Math.abs(wcs.channelOf(q.velocity)-q.channel)); }
  const meta=[head.frame===h.frame,head.equinox===h.equinox,head.projection===h.projection,head.spectral.type===h.spectralType,head.spectral.convention===h.convention,head.spectral.frame===h.specsys,head.spectral.restFrequencyHz===h.restFrequencyHz];
  const bad = nul||sky>1e-11||gal>1e-11||vel>1e-9||freq>1e-13||inv>1e-7||meta.includes(false);
  console.log(bad?'BAD':'ok',h.id,sky.toExponential(1),gal.toExponential(1),vel.toExponential(1),freq.toExponential(1),inv.toExponential(1),nul,meta.every(Boolean)?'':meta.join(),head.cautions.filter(c=>!/BUNIT/.test(c)).join('; '));
  } catch(e){console.log('ERR',h.id,e)}
}
