// Made by spacegroup-data/generate.mjs from spacegroup-data/settings.yaml; edit that file and run `npm run data`.

/** number|Hall|short|full|choice|standard|former symbol|fingerprint of the operators, one row a setting. */
export const settingRows = `1|P 1|P1|P 1||*||70od6x
2|-P 1|P-1|P -1||*||60piz2
3|P 2y|P2|P 1 2 1|b|*||1knygb5
3|P 2|P2|P 1 1 2|c|||jqgacv
3|P 2x|P2|P 2 1 1|a|||qui4nz
4|P 2yb|P2_1|P 1 2_1 1|b|*||1q1tu7y
4|P 2c|P2_1|P 1 1 2_1|c|||1jzyev0
4|P 2xa|P2_1|P 2_1 1 1|a|||hpquh8
5|C 2y|C2|C 1 2 1|b1|*||1yuvdhf
5|A 2y|C2|A 1 2 1|b2|||1cxqe77
5|I 2y|C2|I 1 2 1|b3|||175w4oe
5|A 2|C2|A 1 1 2|c1|||1wpvqy1
5|B 2|C2|B 1 1 2|c2|||f5rbn5
5|I 2|C2|I 1 1 2|c3|||1ihx2jk
5|B 2x|C2|B 2 1 1|a1|||v6s1e1
5|C 2x|C2|C 2 1 1|a2|||1nm984h
5|I 2x|C2|I 2 1 1|a3|||bmytbc
6|P -2y|Pm|P 1 m 1|b|*||17flb5c
6|P -2|Pm|P 1 1 m|c|||k9lsce
6|P -2x|Pm|P m 1 1|a|||vctw1q
7|P -2yc|Pc|P 1 c 1|b1|*||j6gj5d
7|P -2yac|Pc|P 1 n 1|b2|||1k8trdi
7|P -2ya|Pc|P 1 a 1|b3|||9ce6r5
7|P -2a|Pc|P 1 1 a|c1|||1ruhkif
7|P -2ab|Pc|P 1 1 n|c2|||1sm8hlo
7|P -2b|Pc|P 1 1 b|c3|||yrflvz
7|P -2xb|Pc|P b 1 1|a1|||1do4tsf
7|P -2xbc|Pc|P n 1 1|a2|||73ni8s
7|P -2xc|Pc|P c 1 1|a3|||axovx3
8|C -2y|Cm|C 1 m 1|b1|*||d8fipa
8|A -2y|Cm|A 1 m 1|b2|||ubtx72
8|I -2y|Cm|I 1 m 1|b3|||1ky0p1h
8|A -2|Cm|A 1 1 m|c1|||gfdvys
8|B -2|Cm|B 1 1 m|c2|||57s5i4
8|I -2|Cm|I 1 1 m|c3|||5v8ggf
8|B -2x|Cm|B m 1 1|a1|||bl92n0
8|C -2x|Cm|C m 1 1|a2|||1ng8t4k
8|I -2x|Cm|I m 1 1|a3|||1mrzgsv
9|C -2yc|Cc|C 1 c 1|b1|*||lhca6f
9|A -2yac|Cc|A 1 n 1|b2|||160uk2s
9|I -2ya|Cc|I 1 a 1|b3|||e0vyfv
9|A -2ya|Cc|A 1 a 1|-b1|||1a3fdgn
9|C -2ybc|Cc|C 1 n 1|-b2|||8dga6k
9|I -2yc|Cc|I 1 c 1|-b3|||1uzg4b6
9|A -2a|Cc|A 1 1 a|c1|||30e06l
9|B -2bc|Cc|B 1 1 n|c2|||1dlrjqq
9|I -2b|Cc|I 1 1 b|c3|||9svlic
9|B -2b|Cc|B 1 1 b|-c1|||hcjlid
9|A -2ac|Cc|A 1 1 n|-c2|||ln4ch6
9|I -2a|Cc|I 1 1 a|-c3|||wmah19
9|B -2xb|Cc|B b 1 1|a1|||3gn085
9|C -2xbc|Cc|C n 1 1|a2|||11fw956
9|I -2xc|Cc|I c 1 1|a3|||1imwbh8
9|C -2xc|Cc|C c 1 1|-a1|||vdko5p
9|B -2xbc|Cc|B n 1 1|-a2|||1m65lki
9|I -2xb|Cc|I b 1 1|-a3|||1mo017o
10|-P 2y|P2/m|P 1 2/m 1|b|*||fd9ghn
10|-P 2|P2/m|P 1 1 2/m|c|||3dmu03
10|-P 2x|P2/m|P 2/m 1 1|a|||f3o15f
11|-P 2yb|P2_1/m|P 1 2_1/m 1|b|*||1lff10t
11|-P 2c|P2_1/m|P 1 1 2_1/m|c|||ulnuo1
11|-P 2xa|P2_1/m|P 2_1/m 1 1|a|||19kw575
12|-C 2y|C2/m|C 1 2/m 1|b1|*||1c0nxdp
12|-A 2y|C2/m|A 1 2/m 1|b2|||l1xo65
12|-I 2y|C2/m|I 1 2/m 1|b3|||3bbwqs
12|-A 2|C2/m|A 1 1 2/m|c1|||f6sq9x
12|-B 2|C2/m|B 1 1 2/m|c2|||3kd3rh
12|-I 2|C2/m|I 1 1 2/m|c3|||38qaes
12|-B 2x|C2/m|B 2/m 1 1|a1|||1rrmp0l
12|-C 2x|C2/m|C 2/m 1 1|a2|||1hyzaf1
12|-I 2x|C2/m|I 2/m 1 1|a3|||tmb2po
13|-P 2yc|P2/c|P 1 2/c 1|b1|*||t1o2hh
13|-P 2yac|P2/c|P 1 2/n 1|b2|||yzddvr
13|-P 2ya|P2/c|P 1 2/a 1|b3|||wqcc7p
13|-P 2a|P2/c|P 1 1 2/a|c1|||munftt
13|-P 2ab|P2/c|P 1 1 2/n|c2|||cwwcmv
13|-P 2b|P2/c|P 1 1 2/b|c3|||16dh66x
13|-P 2xb|P2/c|P 2/b 1 1|a1|||9z6hl5
13|-P 2xbc|P2/c|P 2/n 1 1|a2|||yizx9b
13|-P 2xc|P2/c|P 2/c 1 1|a3|||iuqhpt
14|-P 2ybc|P2_1/c|P 1 2_1/c 1|b1|*||cnc8pj
14|-P 2yn|P2_1/c|P 1 2_1/n 1|b2|||1s8ztht
14|-P 2yab|P2_1/c|P 1 2_1/a 1|b3|||1m4su6v
14|-P 2ac|P2_1/c|P 1 1 2_1/a|c1|||l7eerj
14|-P 2n|P2_1/c|P 1 1 2_1/n|c2|||2jw0v1
14|-P 2bc|P2_1/c|P 1 1 2_1/b|c3|||1kq1kvj
14|-P 2xab|P2_1/c|P 2_1/b 1 1|a1|||6qn7jb
14|-P 2xn|P2_1/c|P 2_1/n 1 1|a2|||rziob1
14|-P 2xac|P2_1/c|P 2_1/c 1 1|a3|||1s6dk6n
15|-C 2yc|C2/c|C 1 2/c 1|b1|*||fa3whr
15|-A 2yac|C2/c|A 1 2/n 1|b2|||1ltca55
15|-I 2ya|C2/c|I 1 2/a 1|b3|||fl48co
15|-A 2ya|C2/c|A 1 2/a 1|-b1|||7aupa7
15|-C 2ybc|C2/c|C 1 2/n 1|-b2|||x06iq1
15|-I 2yc|C2/c|I 1 2/c 1|-b3|||1nbqacm
15|-A 2a|C2/c|A 1 1 2/a|c1|||11djgwj
15|-B 2bc|C2/c|B 1 1 2/n|c2|||cmuo61
15|-I 2b|C2/c|I 1 1 2/b|c3|||16pwyq
15|-B 2b|C2/c|B 1 1 2/b|-c1|||1jhhlzf
15|-A 2ac|C2/c|A 1 1 2/n|-c2|||15ea31d
15|-I 2a|C2/c|I 1 1 2/a|-c3|||1640m6g
15|-B 2xb|C2/c|B 2/b 1 1|a1|||xdqc1v
15|-C 2xbc|C2/c|C 2/n 1 1|a2|||1t9t095
15|-I 2xc|C2/c|I 2/c 1 1|a3|||5ldq8y
15|-C 2xc|C2/c|C 2/c 1 1|-a1|||khj85n
15|-B 2xbc|C2/c|B 2/n 1 1|-a2|||k3zqtt
15|-I 2xb|C2/c|I 2/b 1 1|-a3|||p05fnu
16|P 2 2|P222|P 2 2 2||*||50uoal
17|P 2c 2|P222_1|P 2 2 2_1||*||1imyeh9
17|P 2a 2a|P2_122|P 2_1 2 2|cab|||1wn4kp3
17|P 2 2b|P22_12|P 2 2_1 2|bca|||10fesi1
18|P 2 2ab|P2_12_12|P 2_1 2_1 2||*||2kf9ad
18|P 2bc 2|P22_12_1|P 2 2_1 2_1|cab|||lei5yl
18|P 2ac 2ac|P2_122_1|P 2_1 2 2_1|bca|||12k6bg9
19|P 2ac 2ab|P2_12_12_1|P 2_1 2_1 2_1||*||fg8g7f
20|C 2c 2|C222_1|C 2 2 2_1||*||1v4f6ov
20|A 2a 2a|A2_122|A 2_1 2 2|cab|||vwgdm9
20|B 2 2b|B22_12|B 2 2_1 2|bca|||ryhf
21|C 2 2|C222|C 2 2 2||*||12pn7br
21|A 2 2|A222|A 2 2 2|cab|||13eq113
21|B 2 2|B222|B 2 2 2|bca|||100j0ov
22|F 2 2|F222|F 2 2 2||*||ftmr49
23|I 2 2|I222|I 2 2 2||*||1xpsimq
24|I 2b 2c|I2_12_12_1|I 2_1 2_1 2_1||*||sjcu0m
25|P 2 -2|Pmm2|P m m 2||*||581pxh
25|P -2 2|P2mm|P 2 m m|cab|||1xgxwld
25|P -2 -2|Pm2m|P m 2 m|bca|||atqa1p
26|P 2c -2|Pmc2_1|P m c 2_1||*||131f4ph
26|P 2c -2c|Pcm2_1|P c m 2_1|ba-c|||fn7ugn
26|P -2a 2a|P2_1ma|P 2_1 m a|cab|||xw5l7x
26|P -2 2a|P2_1am|P 2_1 a m|-cba|||1xhra8b
26|P -2 -2b|Pb2_1m|P b 2_1 m|bca|||1t63jor
26|P -2b -2|Pm2_1b|P m 2_1 b|a-cb|||1lcs7bd
27|P 2 -2c|Pcc2|P c c 2||*||122zymd
27|P -2a 2|P2aa|P 2 a a|cab|||zi0wxh
27|P -2b -2b|Pb2b|P b 2 b|bca|||15is7qt
28|P 2 -2a|Pma2|P m a 2||*||l4lo79
28|P 2 -2b|Pbm2|P b m 2|ba-c|||1mlmfct
28|P -2b 2|P2mb|P 2 m b|cab|||83x6ol
28|P -2c 2|P2cm|P 2 c m|-cba|||oyuwc5
28|P -2c -2c|Pc2m|P c 2 m|bca|||1o34925
28|P -2a -2a|Pm2a|P m 2 a|a-cb|||19p1k71
29|P 2c -2ac|Pca2_1|P c a 2_1||*||1jvtomr
29|P 2c -2b|Pbc2_1|P b c 2_1|ba-c|||n5ru0d
29|P -2b 2a|P2_1ab|P 2_1 a b|cab|||yts5ln
29|P -2ac 2a|P2_1ca|P 2_1 c a|-cba|||137chm9
29|P -2bc -2c|Pc2_1b|P c 2_1 b|bca|||1vwjfrd
29|P -2a -2ab|Pb2_1a|P b 2_1 a|a-cb|||q5gt7b
30|P 2 -2bc|Pnc2|P n c 2||*||rz9x8h
30|P 2 -2ac|Pcn2|P c n 2|ba-c|||1joz769
30|P -2ac 2|P2na|P 2 n a|cab|||14jmtn1
30|P -2ab 2|P2an|P 2 a n|-cba|||17ytjs5
30|P -2ab -2ab|Pb2n|P b 2 n|bca|||1w9y9y9
30|P -2bc -2bc|Pn2b|P n 2 b|a-cb|||1vic35l
31|P 2ac -2|Pmn2_1|P m n 2_1||*||d4dvyx
31|P 2bc -2bc|Pnm2_1|P n m 2_1|ba-c|||ftcs75
31|P -2ab 2ab|P2_1mn|P 2_1 m n|cab|||hhn0n9
31|P -2 2ac|P2_1nm|P 2_1 n m|-cba|||1p884f9
31|P -2 -2bc|Pn2_1m|P n 2_1 m|bca|||1ht3s3l
31|P -2ab -2|Pm2_1n|P m 2_1 n|a-cb|||n3fwyx
32|P 2 -2ab|Pba2|P b a 2||*||85po3t
32|P -2bc 2|P2cb|P 2 c b|cab|||1txjnk5
32|P -2ac -2ac|Pc2a|P c 2 a|bca|||g1sqq1
33|P 2c -2n|Pna2_1|P n a 2_1||*||eeqo2r
33|P 2c -2ab|Pbn2_1|P b n 2_1|ba-c|||k2ss55
33|P -2bc 2a|P2_1nb|P 2_1 n b|cab|||1ephffz
33|P -2n 2a|P2_1cn|P 2_1 c n|-cba|||f16ahd
33|P -2n -2ac|Pc2_1n|P c 2_1 n|bca|||y8qg79
33|P -2ac -2n|Pn2_1a|P n 2_1 a|a-cb|||1d4v23b
34|P 2 -2n|Pnn2|P n n 2||*||ok7o5d
34|P -2n 2|P2nn|P 2 n n|cab|||1o8slx5
34|P -2n -2n|Pn2n|P n 2 n|bca|||min67t
35|C 2 -2|Cmm2|C m m 2||*||tfzl4v
35|A -2 2|A2mm|A 2 m m|cab|||ul3fq3
35|B -2 -2|Bm2m|B m 2 m|bca|||1ywstzr
36|C 2c -2|Cmc2_1|C m c 2_1||*||1mb5j8n
36|C 2c -2c|Ccm2_1|C c m 2_1|ba-c|||1bchr6p
36|A -2a 2a|A2_1ma|A 2_1 m a|cab|||1cxlu1z
36|A -2 2a|A2_1am|A 2_1 a m|-cba|||1vdcgbp
36|B -2 -2b|Bb2_1m|B b 2_1 m|bca|||1d4xglh
36|B -2b -2|Bm2_1b|B m 2_1 b|a-cb|||u0j2cz
37|C 2 -2c|Ccc2|C c c 2||*||1tdpkan
37|A -2a 2|A2aa|A 2 a a|cab|||qnv487
37|B -2b -2b|Bb2b|B b 2 b|bca|||1qbuypb
38|A 2 -2|Amm2|A m m 2||*||tmbvvj
38|B 2 -2|Bmm2|B m m 2|ba-c|||1i8jht3
38|B -2 2|B2mm|B 2 m m|cab|||4os9er
38|C -2 2|C2mm|C 2 m m|-cba|||pztzln
38|C -2 -2|Cm2m|C m 2 m|bca|||yxwkof
38|A -2 -2|Am2m|A m 2 m|a-cb|||1lft9n3
39|A 2 -2c|Aem2|A e m 2||*|Abm2|1wh56fz
39|B 2 -2c|Bme2|B m e 2|ba-c||Bma2|15f0vev
39|B -2c 2|B2em|B 2 e m|cab||B2cm|1wejrnz
39|C -2b 2|C2me|C 2 m e|-cba||C2mb|1nhxguv
39|C -2b -2b|Cm2e|C m 2 e|bca||Cm2a|lbhdnr
39|A -2c -2c|Ae2m|A e 2 m|a-cb||Ac2m|1puai4v
40|A 2 -2a|Ama2|A m a 2||*||dr8sn3
40|B 2 -2b|Bbm2|B b m 2|ba-c|||yed2pr
40|B -2b 2|B2mb|B 2 m b|cab|||z6of8f
40|C -2c 2|C2cm|C 2 c m|-cba|||1le1unb
40|C -2c -2c|Cc2m|C c 2 m|bca|||nvtd67
40|A -2a -2a|Am2a|A m 2 a|a-cb|||1qudobz
41|A 2 -2ac|Aea2|A e a 2||*|Aba2|1y6ac2j
41|B 2 -2bc|Bbe2|B b e 2|ba-c||Bba2|ajjwxn
41|B -2bc 2|B2eb|B 2 e b|cab||B2cb|19f6ei7
41|C -2bc 2|C2ce|C 2 c e|-cba||C2cb|ww5rxj
41|C -2bc -2bc|Cc2e|C c 2 e|bca||Cc2a|1suazpf
41|A -2ac -2ac|Ae2a|A e 2 a|a-cb||Ac2a|1irji8b
42|F 2 -2|Fmm2|F m m 2||*||skzdk1
42|F -2 2|F2mm|F 2 m m|cab|||1hxvtjx
42|F -2 -2|Fm2m|F m 2 m|bca|||j8d3bt
43|F 2 -2d|Fdd2|F d d 2||*||l5zcrx
43|F -2d 2|F2dd|F 2 d d|cab|||wdpd39
43|F -2d -2d|Fd2d|F d 2 d|bca|||1y0vwo5
44|I 2 -2|Imm2|I m m 2||*||s25ohe
44|I -2 2|I2mm|I 2 m m|cab|||1r4jmwm
44|I -2 -2|Im2m|I m 2 m|bca|||8w3wqa
45|I 2 -2c|Iba2|I b a 2||*||4s6s3q
45|I -2a 2|I2cb|I 2 c b|cab|||26xmlm
45|I -2b -2b|Ic2a|I c 2 a|bca|||e2hi5y
46|I 2 -2a|Ima2|I m a 2||*||sh4goe
46|I 2 -2b|Ibm2|I b m 2|ba-c|||1ly2fp2
46|I -2b 2|I2mb|I 2 m b|cab|||kvwyc6
46|I -2c 2|I2cm|I 2 c m|-cba|||1d1tfmu
46|I -2c -2c|Ic2m|I c 2 m|bca|||19g6mfa
46|I -2a -2a|Im2a|I m 2 a|a-cb|||y7h7la
47|-P 2 2|Pmmm|P 2/m 2/m 2/m||*||1nr1kpr
48|P 2 2 -1n|Pnnn|P 2/n 2/n 2/n|1|||1nszzs7
48|-P 2ab 2bc|Pnnn|P 2/n 2/n 2/n|2|*||1yo83g7
49|-P 2 2c|Pccm|P 2/c 2/c 2/m||*||1tzdo0j
49|-P 2a 2|Pmaa|P 2/m 2/a 2/a|cab|||uburg7
49|-P 2b 2b|Pbmb|P 2/b 2/m 2/b|bca|||fpky37
50|P 2 2 -1ab|Pban|P 2/b 2/a 2/n|1|||1bd154f
50|-P 2ab 2b|Pban|P 2/b 2/a 2/n|2|*||1rpqkmv
50|P 2 2 -1bc|Pncb|P 2/n 2/c 2/b|1cab|||nfhg0f
50|-P 2b 2bc|Pncb|P 2/n 2/c 2/b|2cab|||yfg9sj
50|P 2 2 -1ac|Pcna|P 2/c 2/n 2/a|1bca|||2xnih3
50|-P 2a 2c|Pcna|P 2/c 2/n 2/a|2bca|||el6m4b
51|-P 2a 2a|Pmma|P 2_1/m 2/m 2/a||*||fn056b
51|-P 2b 2|Pmmb|P 2/m 2_1/m 2/b|ba-c|||wmqj8n
51|-P 2 2b|Pbmm|P 2/b 2_1/m 2/m|cab|||1kjn1gz
51|-P 2c 2c|Pcmm|P 2/c 2/m 2_1/m|-cba|||1p9np0z
51|-P 2c 2|Pmcm|P 2/m 2/c 2_1/m|bca|||11hs00n
51|-P 2 2a|Pmam|P 2_1/m 2/a 2/m|a-cb|||1uvzto3
52|-P 2a 2bc|Pnna|P 2/n 2_1/n 2/a||*||1aczbbn
52|-P 2b 2n|Pnnb|P 2_1/n 2/n 2/b|ba-c|||17gti2f
52|-P 2n 2b|Pbnn|P 2/b 2/n 2_1/n|cab|||1gr1stj
52|-P 2ab 2c|Pcnn|P 2/c 2_1/n 2/n|-cba|||167bp1b
52|-P 2ab 2n|Pncn|P 2_1/n 2/c 2/n|bca|||67ap5f
52|-P 2n 2bc|Pnan|P 2/n 2/a 2_1/n|a-cb|||1mr77k7
53|-P 2ac 2|Pmna|P 2/m 2/n 2_1/a||*||uqqcqb
53|-P 2bc 2bc|Pnmb|P 2/n 2/m 2_1/b|ba-c|||1nbvx3r
53|-P 2ab 2ab|Pbmn|P 2_1/b 2/m 2/n|cab|||11uus4n
53|-P 2 2ac|Pcnm|P 2_1/c 2/n 2/m|-cba|||1yn6flv
53|-P 2 2bc|Pncm|P 2/n 2_1/c 2/m|bca|||y4uhzv
53|-P 2ab 2|Pman|P 2/m 2_1/a 2/n|a-cb|||ddmwi3
54|-P 2a 2ac|Pcca|P 2_1/c 2/c 2/a||*||1v4upbn
54|-P 2b 2c|Pccb|P 2/c 2_1/c 2/b|ba-c|||n1phl7
54|-P 2a 2b|Pbaa|P 2/b 2_1/a 2/a|cab|||v8fqsb
54|-P 2ac 2c|Pcaa|P 2/c 2/a 2_1/a|-cba|||1eyl1vr
54|-P 2bc 2b|Pbcb|P 2/b 2/c 2_1/b|bca|||18v7u5j
54|-P 2b 2ab|Pbab|P 2_1/b 2/a 2/b|a-cb|||1ao1yib
55|-P 2 2ab|Pbam|P 2_1/b 2_1/a 2/m||*||bj49ir
55|-P 2bc 2|Pmcb|P 2/m 2_1/c 2_1/b|cab|||1ij9aqr
55|-P 2ac 2ac|Pcma|P 2_1/c 2/m 2_1/a|bca|||187uf1z
56|-P 2ab 2ac|Pccn|P 2_1/c 2_1/c 2/n||*||1vvuf8v
56|-P 2ac 2bc|Pnaa|P 2/n 2_1/a 2_1/a|cab|||11wuqev
56|-P 2bc 2ab|Pbnb|P 2_1/b 2/n 2_1/b|bca|||1l6jvpj
57|-P 2c 2b|Pbcm|P 2/b 2_1/c 2_1/m||*||hwzjbn
57|-P 2c 2ac|Pcam|P 2_1/c 2/a 2_1/m|ba-c|||j7vjsj
57|-P 2ac 2a|Pmca|P 2_1/m 2/c 2_1/a|cab|||1er0ytj
57|-P 2b 2a|Pmab|P 2_1/m 2_1/a 2/b|-cba|||19za9qr
57|-P 2a 2ab|Pbma|P 2_1/b 2_1/m 2/a|bca|||vizlnn
57|-P 2bc 2c|Pcmb|P 2/c 2_1/m 2_1/b|a-cb|||lb0unz
58|-P 2 2n|Pnnm|P 2_1/n 2_1/n 2/m||*||gig1bz
58|-P 2n 2|Pmnn|P 2/m 2_1/n 2_1/n|cab|||o0eg3
58|-P 2n 2n|Pnmn|P 2_1/n 2/m 2_1/n|bca|||1lpnm3f
59|P 2 2ab -1ab|Pmmn|P 2_1/m 2_1/m 2/n|1|||1iktkgr
59|-P 2ab 2a|Pmmn|P 2_1/m 2_1/m 2/n|2|*||rpa3gv
59|P 2bc 2 -1bc|Pnmm|P 2/n 2_1/m 2_1/m|1cab|||1a2kpk3
59|-P 2c 2bc|Pnmm|P 2/n 2_1/m 2_1/m|2cab|||yycm9v
59|P 2ac 2ac -1ac|Pmnm|P 2_1/m 2/n 2_1/m|1bca|||nrhovb
59|-P 2c 2a|Pmnm|P 2_1/m 2/n 2_1/m|2bca|||1yea857
60|-P 2n 2ab|Pbcn|P 2_1/b 2/c 2_1/n||*||1kwwimn
60|-P 2n 2c|Pcan|P 2/c 2_1/a 2_1/n|ba-c|||15jifjz
60|-P 2a 2n|Pnca|P 2_1/n 2_1/c 2/a|cab|||1h6pnwn
60|-P 2bc 2n|Pnab|P 2_1/n 2/a 2_1/b|-cba|||b3o7d7
60|-P 2ac 2b|Pbna|P 2/b 2_1/n 2_1/a|bca|||oq0m1r
60|-P 2b 2ac|Pcnb|P 2_1/c 2_1/n 2/b|a-cb|||111hp83
61|-P 2ac 2ab|Pbca|P 2_1/b 2_1/c 2_1/a||*||169d2cf
61|-P 2bc 2ac|Pcab|P 2_1/c 2_1/a 2_1/b|ba-c|||1yqdo8n
62|-P 2ac 2n|Pnma|P 2_1/n 2_1/m 2_1/a||*||1drr3ej
62|-P 2bc 2a|Pmnb|P 2_1/m 2_1/n 2_1/b|ba-c|||ys3f07
62|-P 2c 2ab|Pbnm|P 2_1/b 2_1/n 2_1/m|cab|||asfz6j
62|-P 2n 2ac|Pcmn|P 2_1/c 2_1/m 2_1/n|-cba|||bnwj7z
62|-P 2n 2a|Pmcn|P 2_1/m 2_1/c 2_1/n|bca|||14x54xb
62|-P 2c 2n|Pnam|P 2_1/n 2_1/a 2_1/m|a-cb|||lk2wo7
63|-C 2c 2|Cmcm|C 2/m 2/c 2_1/m||*||g9hhft
63|-C 2c 2c|Ccmm|C 2/c 2/m 2_1/m|ba-c|||cq6545
63|-A 2a 2a|Amma|A 2_1/m 2/m 2/a|cab|||a5bp6t
63|-A 2 2a|Amam|A 2_1/m 2/a 2/m|-cba|||hm4vvp
63|-B 2 2b|Bbmm|B 2/b 2_1/m 2/m|bca|||1vgrmyt
63|-B 2b 2|Bmmb|B 2/m 2_1/m 2/b|a-cb|||183mlo9
64|-C 2bc 2|Cmce|C 2/m 2/c 2_1/e||*|Cmca|b16qwd
64|-C 2bc 2bc|Ccme|C 2/c 2/m 2_1/e|ba-c||Ccmb|1itekzt
64|-A 2ac 2ac|Aema|A 2_1/e 2/m 2/a|cab||Abma|yeocjt
64|-A 2 2ac|Aeam|A 2_1/e 2/a 2/m|-cba||Acam|1kdq1dx
64|-B 2 2bc|Bbem|B 2/b 2_1/e 2/m|bca||Bbcm|efu459
64|-B 2bc 2|Bmeb|B 2/m 2_1/e 2/b|a-cb||Bmab|xpp4l
65|-C 2 2|Cmmm|C 2/m 2/m 2/m||*||1yvkpgh
65|-A 2 2|Ammm|A 2/m 2/m 2/m|cab|||qh5br5
65|-B 2 2|Bmmm|B 2/m 2/m 2/m|bca|||1btee95
66|-C 2 2c|Cccm|C 2/c 2/c 2/m||*||w8loed
66|-A 2a 2|Amaa|A 2/m 2/a 2/a|cab|||1s2iq09
66|-B 2b 2b|Bbmb|B 2/b 2/m 2/b|bca|||xrqwsd
67|-C 2b 2|Cmme|C 2/m 2/m 2/e||*|Cmma|3c4z9t
67|-C 2b 2b|Cmme|C 2/m 2/m 2/e|ba-c||Cmmb|tc1col
67|-A 2c 2c|Aemm|A 2/e 2/m 2/m|cab||Abmm|1wh4vut
67|-A 2 2c|Aemm|A 2/e 2/m 2/m|-cba||Acmm|f2hs85
67|-B 2 2c|Bmem|B 2/m 2/e 2/m|bca||Bmcm|1rgrfbh
67|-B 2c 2|Bmem|B 2/m 2/e 2/m|a-cb||Bmam|tmcjch
68|C 2 2 -1bc|Ccce|C 2/c 2/c 2/e|1||Ccca|qhfe01
68|-C 2b 2bc|Ccce|C 2/c 2/c 2/e|2|*|Ccca|1hj8ncl
68|C 2 2 -1bc|Ccce|C 2/c 2/c 2/e|1ba-c||Cccb|qhfe01
68|-C 2b 2c|Ccce|C 2/c 2/c 2/e|2ba-c||Cccb|vcpq79
68|A 2 2 -1ac|Aeaa|A 2/e 2/a 2/a|1cab||Abaa|79y0u1
68|-A 2a 2c|Aeaa|A 2/e 2/a 2/a|2cab||Abaa|pgvr19
68|A 2 2 -1ac|Aeaa|A 2/e 2/a 2/a|1-cba||Acaa|79y0u1
68|-A 2ac 2c|Aeaa|A 2/e 2/a 2/a|2-cba||Acaa|me7yih
68|B 2 2 -1bc|Bbeb|B 2/b 2/e 2/b|1bca||Bbcb|1o8i7jd
68|-B 2bc 2b|Bbeb|B 2/b 2/e 2/b|2bca||Bbcb|pilk0h
68|B 2 2 -1bc|Bbeb|B 2/b 2/e 2/b|1a-cb||Bbab|1o8i7jd
68|-B 2b 2bc|Bbeb|B 2/b 2/e 2/b|2a-cb||Bbab|qvhr25
69|-F 2 2|Fmmm|F 2/m 2/m 2/m||*||1sz3a57
70|F 2 2 -1d|Fddd|F 2/d 2/d 2/d|1|||wx1hc3
70|-F 2uv 2vw|Fddd|F 2/d 2/d 2/d|2|*||1ong7qz
71|-I 2 2|Immm|I 2/m 2/m 2/m||*||h5iuqw
72|-I 2 2c|Ibam|I 2/b 2/a 2/m||*||10n79bc
72|-I 2a 2|Imcb|I 2/m 2/c 2/b|cab|||qwc92s
72|-I 2b 2b|Icma|I 2/c 2/m 2/a|bca|||bi8fb8
73|-I 2b 2c|Ibca|I 2/b 2/c 2/a||*||agz7l0
73|-I 2a 2b|Icab|I 2/c 2/a 2/b|ba-c|||oitac4
74|-I 2b 2|Imma|I 2/m 2/m 2/a||*||1dzuhxg
74|-I 2a 2a|Immb|I 2/m 2/m 2/b|ba-c|||1apmdw0
74|-I 2c 2c|Ibmm|I 2/b 2/m 2/m|cab|||sbettg
74|-I 2 2b|Icmm|I 2/c 2/m 2/m|-cba|||zmr388
74|-I 2 2a|Imcm|I 2/m 2/c 2/m|bca|||9shnd8
74|-I 2c 2|Imam|I 2/m 2/a 2/m|a-cb|||umehj0
75|P 4|P4|P 4||*||1018069
76|P 4w|P4_1|P 4_1||*||1bdk3o7
77|P 4c|P4_2|P 4_2||*||epvwmt
78|P 4cw|P4_3|P 4_3||*||1uk7955
79|I 4|I4|I 4||*||1l04puu
80|I 4bw|I4_1|I 4_1||*||1ifyh0y
81|P -4|P-4|P -4||*||hykjz5
82|I -4|I-4|I -4||*||120vrra
83|-P 4|P4/m|P 4/m||*||gdozuv
84|-P 4c|P4_2/m|P 4_2/m||*||1y6463
85|P 4ab -1ab|P4/n|P 4/n|1|||9ftc7j
85|-P 4a|P4/n|P 4/n|2|*||6lw5pj
86|P 4n -1n|P4_2/n|P 4_2/n|1|||3ytuj7
86|-P 4bc|P4_2/n|P 4_2/n|2|*||1iz7bn3
87|-I 4|I4/m|I 4/m||*||1l84vfc
88|I 4bw -1bw|I4_1/a|I 4_1/a|1|||1quwr14
88|-I 4ad|I4_1/a|I 4_1/a|2|*||y3wof6
89|P 4 2|P422|P 4 2 2||*||86r5tf
90|P 4ab 2ab|P42_12|P 4 2_1 2||*||8jy4x3
91|P 4w 2c|P4_122|P 4_1 2 2||*||jw6bkl
92|P 4abw 2nw|P4_12_12|P 4_1 2_1 2||*||1cwhaxj
93|P 4c 2|P4_222|P 4_2 2 2||*||uxe1tb
94|P 4n 2n|P4_22_12|P 4_2 2_1 2||*||gx5czb
95|P 4cw 2c|P4_322|P 4_3 2 2||*||13wid61
96|P 4nw 2abw|P4_32_12|P 4_3 2_1 2||*||1avzldv
97|I 4 2|I422|I 4 2 2||*||11l6084
98|I 4bw 2bw|I4_122|I 4_1 2 2||*||yo1v74
99|P 4 -2|P4mm|P 4 m m||*||p8esxj
100|P 4 -2ab|P4bm|P 4 b m||*||5oo2wb
101|P 4c -2c|P4_2cm|P 4_2 c m||*||aft2ln
102|P 4n -2n|P4_2nm|P 4_2 n m||*||12vnalf
103|P 4 -2c|P4cc|P 4 c c||*||jugaor
104|P 4 -2n|P4nc|P 4 n c||*||dhjjhj
105|P 4c -2|P4_2mc|P 4_2 m c||*||bgwi8v
106|P 4c -2ab|P4_2bc|P 4_2 b c||*||1w54vmz
107|I 4 -2|I4mm|I 4 m m||*||879vag
108|I 4 -2c|I4cm|I 4 c m||*||puqv1s
109|I 4bw -2|I4_1md|I 4_1 m d||*||vac9k4
110|I 4bw -2c|I4_1cd|I 4_1 c d||*||xxvbuw
111|P -4 2|P-42m|P -4 2 m||*||1r0h927
112|P -4 2c|P-42c|P -4 2 c||*||q08vwv
113|P -4 2ab|P-42_1m|P -4 2_1 m||*||wb8a7
114|P -4 2n|P-42_1c|P -4 2_1 c||*||1bndxuv
115|P -4 -2|P-4m2|P -4 m 2||*||1mzx8uz
116|P -4 -2c|P-4c2|P -4 c 2||*||1jqhkvf
117|P -4 -2ab|P-4b2|P -4 b 2||*||v5exiz
118|P -4 -2n|P-4n2|P -4 n 2||*||n5os6z
119|I -4 -2|I-4m2|I -4 m 2||*||1nzn7ng
120|I -4 -2c|I-4c2|I -4 c 2||*||cxc8d8
121|I -4 2|I-42m|I -4 2 m||*||2rwf9s
122|I -4 2bw|I-42d|I -4 2 d||*||1uhcs0w
123|-P 4 2|P4/mmm|P 4/m 2/m 2/m||*||th4l67
124|-P 4 2c|P4/mcc|P 4/m 2/c 2/c||*||jq0g13
125|P 4 2 -1ab|P4/nbm|P 4/n 2/b 2/m|1|||1ehjp33
125|-P 4a 2b|P4/nbm|P 4/n 2/b 2/m|2|*||1iaky9j
126|P 4 2 -1n|P4/nnc|P 4/n 2/n 2/c|1|||e4bvqb
126|-P 4a 2bc|P4/nnc|P 4/n 2/n 2/c|2|*||1oud8t7
127|-P 4 2ab|P4/mbm|P 4/m 2_1/b m||*||1eljfzr
128|-P 4 2n|P4/mnc|P 4/m 2_1/n c||*||140ew0f
129|P 4ab 2ab -1ab|P4/nmm|P 4/n 2_1/m m|1|||zzwk6v
129|-P 4a 2a|P4/nmm|P 4/n 2_1/m m|2|*||185brcr
130|P 4ab 2n -1ab|P4/ncc|P 4/n 2_1/c c|1|||1wlomo7
130|-P 4a 2ac|P4/ncc|P 4/n 2_1/c c|2|*||97un5b
131|-P 4c 2|P4_2/mmc|P 4_2/m 2/m 2/c||*||1j8hy47
132|-P 4c 2c|P4_2/mcm|P 4_2/m 2/c 2/m||*||mxkdcn
133|P 4n 2c -1n|P4_2/nbc|P 4_2/n 2/b 2/c|1|||1h12wk3
133|-P 4ac 2b|P4_2/nbc|P 4_2/n 2/b 2/c|2|*||5i3wcj
134|P 4n 2 -1n|P4_2/nnm|P 4_2/n 2/n 2/m|1|||24xqir
134|-P 4ac 2bc|P4_2/nnm|P 4_2/n 2/n 2/m|2|*||3h2gtr
135|-P 4c 2ab|P4_2/mbc|P 4_2/m 2_1/b 2/c||*||14x0if3
136|-P 4n 2n|P4_2/mnm|P 4_2/m 2_1/n 2/m||*||50qrvr
137|P 4n 2n -1n|P4_2/nmc|P 4_2/n 2_1/m 2/c|1|||8gmbpv
137|-P 4ac 2a|P4_2/nmc|P 4_2/n 2_1/m 2/c|2|*||18dpcd3
138|P 4n 2ab -1n|P4_2/ncm|P 4_2/n 2_1/c 2/m|1|||810vbn
138|-P 4ac 2ac|P4_2/ncm|P 4_2/n 2_1/c 2/m|2|*||1f0rqur
139|-I 4 2|I4/mmm|I 4/m 2/m 2/m||*||7cng48
140|-I 4 2c|I4/mcm|I 4/m 2/c 2/m||*||lzq8e0
141|I 4bw 2bw -1bw|I4_1/amd|I 4_1/a 2/m 2/d|1|||at0oo
141|-I 4bd 2|I4_1/amd|I 4_1/a 2/m 2/d|2|*||1vftspg
142|I 4bw 2aw -1bw|I4_1/acd|I 4_1/a 2/c 2/d|1|||98b6sw
142|-I 4bd 2c|I4_1/acd|I 4_1/a 2/c 2/d|2|*||1j7dgt4
143|P 3|P3|P 3||*||qc02hr
144|P 31|P3_1|P 3_1||*||gitz4o
145|P 32|P3_2|P 3_2||*||aho6ac
146|R 3|R3|R 3|H|*||1ipthc5
146|P 3*|R3|R 3|R|||1tf1041
147|-P 3|P-3|P -3||*||19pcfxy
148|-R 3|R-3|R -3|H|*||xaqs38
148|-P 3*|R-3|R -3|R|||14chqfu
149|P 3 2|P312|P 3 1 2||*||1q00yf2
150|P 3 2"|P321|P 3 2 1||*||zjts60
151|P 31 2c (0 0 1)|P3_112|P 3_1 1 2||*||1l2nd5w
152|P 31 2"|P3_121|P 3_1 2 1||*||s6d628
153|P 32 2c (0 0 -1)|P3_212|P 3_2 1 2||*||q1slgw
154|P 32 2"|P3_221|P 3_2 2 1||*||att6a0
155|R 3 2"|R32|R 3 2|H|*||1l5kc3i
155|P 3* 2|R32|R 3 2|R|||st2z2q
156|P 3 -2"|P3m1|P 3 m 1||*||eexgr1
157|P 3 -2|P31m|P 3 1 m||*||aameor
158|P 3 -2"c|P3c1|P 3 c 1||*||1emwxs4
159|P 3 -2c|P31c|P 3 1 c||*||l41r2u
160|R 3 -2"|R3m|R 3 m|H|*||7a9x67
160|P 3* -2|R3m|R 3 m|R|||15z5t1r
161|R 3 -2"c|R3c|R 3 c|H|*||10rn3u6
161|P 3* -2n|R3c|R 3 c|R|||1mn2hja
162|-P 3 2|P-31m|P -3 1 2/m||*||1o0muej
163|-P 3 2c|P-31c|P -3 1 2/c||*||y4xdwt
164|-P 3 2"|P-3m1|P -3 2/m 1||*||1k3c70b
165|-P 3 2"c|P-3c1|P -3 2/c 1||*||swjdgp
166|-R 3 2"|R-3m|R -3 2/m|H|*||u553n1
166|-P 3* 2|R-3m|R -3 2/m|R|||1ewzxcz
167|-R 3 2"c|R-3c|R -3 2/c|H|*||14baf8z
167|-P 3* 2n|R-3c|R -3 2/c|R|||e3tsdp
168|P 6|P6|P 6||*||1qub9q5
169|P 61|P6_1|P 6_1||*||ro3nbj
170|P 65|P6_5|P 6_5||*||r5jdof
171|P 62|P6_2|P 6_2||*||1m91bjr
172|P 64|P6_4|P 6_4||*||1fzti93
173|P 6c|P6_3|P 6_3||*||181nc5s
174|P -6|P-6|P -6||*||10j26mw
175|-P 6|P6/m|P 6/m||*||7ca4ff
176|-P 6c|P6_3/m|P 6_3/m||*||c6g1xp
177|P 6 2|P622|P 6 2 2||*||efp1wz
178|P 61 2 (0 0 -1)|P6_122|P 6_1 2 2||*||9h2zkn
179|P 65 2 (0 0 1)|P6_522|P 6_5 2 2||*||31bfmr
180|P 62 2c (0 0 1)|P6_222|P 6_2 2 2||*||117gjmd
181|P 64 2c (0 0 -1)|P6_422|P 6_4 2 2||*||19s3xsj
182|P 6c 2c|P6_322|P 6_3 2 2||*||14cgt95
183|P 6 -2|P6mm|P 6 m m||*||10yy7kz
184|P 6 -2c|P6cc|P 6 c c||*||hszfwr
185|P 6c -2|P6_3cm|P 6_3 c m||*||e5tvqz
186|P 6c -2c|P6_3mc|P 6_3 m c||*||tw8rgd
187|P -6 2|P-6m2|P -6 m 2||*||w0qbuj
188|P -6c 2|P-6c2|P -6 c 2||*||1qjn7pr
189|P -6 -2|P-62m|P -6 2 m||*||1ab1ktb
190|P -6c -2c|P-62c|P -6 2 c||*||1whrnbj
191|-P 6 2|P6/mmm|P 6/m 2/m 2/m||*||1sckbs7
192|-P 6 2c|P6/mcc|P 6/m 2/c 2/c||*||13pjyyv
193|-P 6c 2|P6_3/mcm|P 6_3/m 2/c 2/m||*||vovj73
194|-P 6c 2c|P6_3/mmc|P 6_3/m 2/m 2/c||*||swhcfj
195|P 2 2 3|P23|P 2 3||*||1jwbk1
196|F 2 2 3|F23|F 2 3||*||n7xsh9
197|I 2 2 3|I23|I 2 3||*||i0ukvi
198|P 2ac 2ab 3|P2_13|P 2_1 3||*||ynhcj3
199|I 2b 2c 3|I2_13|I 2_1 3||*||8jls6g
200|-P 2 2 3|Pm-3|P 2/m -3||*||1mg6um7
201|P 2 2 3 -1n|Pn-3|P 2/n -3|1|||1dig8pb
201|-P 2ab 2bc 3|Pn-3|P 2/n -3|2|*||1uonbu3
202|-F 2 2 3|Fm-3|F 2/m -3||*||jcvcwr
203|F 2 2 3 -1d|Fd-3|F 2/d -3|1|||k4zruz
203|-F 2uv 2vw 3|Fd-3|F 2/d -3|2|*||1yiagj
204|-I 2 2 3|Im-3|I 2/m -3||*||1szpubc
205|-P 2ac 2ab 3|Pa-3|P 2_1/a -3||*||117uzwz
206|-I 2b 2c 3|Ia-3|I 2_1/a -3||*||s0cx70
207|P 4 2 3|P432|P 4 3 2||*||1p33hhr
208|P 4n 2 3|P4_232|P 4_2 3 2||*||ilfy7r
209|F 4 2 3|F432|F 4 3 2||*||ds3jrf
210|F 4d 2 3|F4_132|F 4_1 3 2||*||mthc03
211|I 4 2 3|I432|I 4 3 2||*||1yvnkc8
212|P 4acd 2ab 3|P4_332|P 4_3 3 2||*||d8os2z
213|P 4bd 2ab 3|P4_132|P 4_1 3 2||*||428t5f
214|I 4bd 2c 3|I4_132|I 4_1 3 2||*||1ovcoxg
215|P -4 2 3|P-43m|P -4 3 m||*||17k366j
216|F -4 2 3|F-43m|F -4 3 m||*||e0y4dj
217|I -4 2 3|I-43m|I -4 3 m||*||wd1mz0
218|P -4n 2 3|P-43n|P -4 3 n||*||n3icfn
219|F -4c 2 3|F-43c|F -4 3 c||*||8ivgzr
220|I -4bd 2c 3|I-43d|I -4 3 d||*||q2ekac
221|-P 4 2 3|Pm-3m|P 4/m -3 2/m||*||8hgwen
222|P 4 2 3 -1n|Pn-3n|P 4/n -3 2/n|1|||k1v4fb
222|-P 4a 2bc 3|Pn-3n|P 4/n -3 2/n|2|*||cjvypv
223|-P 4n 2 3|Pm-3n|P 4_2/m -3 2/n||*||10e8van
224|P 4n 2 3 -1n|Pn-3m|P 4_2/n -3 2/m|1|||dlycl3
224|-P 4bc 2bc 3|Pn-3m|P 4_2/n -3 2/m|2|*||ozoz3v
225|-F 4 2 3|Fm-3m|F 4/m -3 2/m||*||h5qnnv
226|-F 4c 2 3|Fm-3c|F 4/m -3 2/c||*||9q54r7
227|F 4d 2 3 -1d|Fd-3m|F 4_1/d -3 2/m|1|||i50u1v
227|-F 4vw 2vw 3|Fd-3m|F 4_1/d -3 2/m|2|*||z2cgcj
228|F 4d 2 3 -1cd|Fd-3c|F 4_1/d -3 2/c|1|||i37xxv
228|-F 4cvw 2vw 3|Fd-3c|F 4_1/d -3 2/c|2|*||1gnqaxr
229|-I 4 2 3|Im-3m|I 4/m -3 2/m||*||xter9c
230|-I 4bd 2c 3|Ia-3d|I 4_1/a -3 2/d||*||1wcjkys`;
