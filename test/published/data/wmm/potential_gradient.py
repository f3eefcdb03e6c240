# The WMM2025 field as the numerical gradient of its potential in Cartesian coordinates, 40 digits.
# Run in this folder: python3 potential_gradient.py (Python 3.11, mpmath 1.3.0)
from mpmath import *
mp.dps=40
co={}
for l in open('WMM2025.COF').readlines()[1:]:
    w=l.split()
    if len(w)==6: co[int(w[0]),int(w[1])]=[mpf(v) for v in w[2:]]
A=mpf(6378137);f=1/mpf('298.257223563');e2=f*(2-f);RE=mpf(6371200)
def Pnm(n,m,x): # Schmidt, no Condon-Shortley: explicit derivative of polynomial
    s=mpf(0)
    for k in range(0,(n-m)//2+1):
        s+=(-1)**k*factorial(2*n-2*k)/(factorial(k)*factorial(n-k)*factorial(n-m-2*k))*x**(n-m-2*k)
    p=s/mpf(2)**n*(1-x*x)**(mpf(m)/2)
    return p*(sqrt(2*factorial(n-m)/factorial(n+m)) if m else 1)
def V(x,y,z,t):
    r=sqrt(x*x+y*y+z*z);mu=z/r;lam=atan2(y,x);v=mpf(0)
    for (n,m),(g,h,gd,hd) in co.items():
        v+=RE*(RE/r)**(n+1)*((g+t*gd)*cos(m*lam)+(h+t*hd)*sin(m*lam))*Pnm(n,m,mu)
    return v
def field(la,lo,h,yr):
    ph=mpf(la)*pi/180;lm=mpf(lo)*pi/180;N=A/sqrt(1-e2*sin(ph)**2);h=mpf(h);t=mpf(yr)-2025
    P=[(N+h)*cos(ph)*cos(lm),(N+h)*cos(ph)*sin(lm),(N*(1-e2)+h)*sin(ph)]
    d={'n':(-sin(ph)*cos(lm),-sin(ph)*sin(lm),cos(ph)),'e':(-sin(lm),cos(lm),mpf(0)),'d':(-cos(ph)*cos(lm),-cos(ph)*sin(lm),-sin(ph))}
    out=[]
    for k in 'ned':
        D=d[k];s=mpf('0.001')
        F=lambda a:V(*[P[i]+a*D[i] for i in range(3)],t)
        out.append(-(8*(F(s)-F(-s))-(F(2*s)-F(-2*s)))/(12*s))
    return [nstr(o,14) for o in out]
for a in [(43,93,65000,2025),(33,-145,12000,2026.5),(-59,-8,39000,2025),(89,-121,28000,2025)]: print(a,field(*a))
