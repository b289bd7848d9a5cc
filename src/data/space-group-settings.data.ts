/**
 * The 530 tabulated settings of the 230 space groups, in the order of their Hall numbers (1 to 530), one a line:
 * space-group number | setting (origin choice, axes or cell choice) | Hall symbol | short Hermann–Mauguin symbol | full
 * symbol where it differs | fingerprint of the operation set (`operationSetFingerprint`).
 *
 * Numbers, codes and symbols are taken over, once, from the table in the package @spglib/moyo-wasm 0.15 (licence MIT OR
 * Apache-2.0), which follows International Tables for Crystallography A and B (S. R. Hall, Acta Cryst. A37, 517 (1981)).
 * Changed against it: subscripts without underscore, `"` for `=`, short monoclinic symbols that keep the cell choice
 * (P 21/n) and, by International Tables A, the full symbols of Nos. 127 to 130 (2/m, 2/c in last place) and the short
 * symbol of Hall number 331 (B b e b). Fingerprints are our own.
 */
export const spaceGroupSettingsTable = String.raw`
1||P 1|P 1||14yksf
2||-P 1|P -1||sxd6b8
3|b|P 2y|P 2|P 1 2 1|tgeomr
3|c|P 2|P 2|P 1 1 2|shupsq
3|a|P 2x|P 2|P 2 1 1|k201lw
4|b|P 2yb|P 21|P 1 21 1|t9d6mb
4|c|P 2c|P 21|P 1 1 21|el4z4k
4|a|P 2xa|P 21|P 21 1 1|i46fxr
5|b1|C 2y|C 2|C 1 2 1|vsni8c
5|b2|A 2y|A 2|A 1 2 1|xwuiio
5|b3|I 2y|I 2|I 1 2 1|1fsypxq
5|c1|A 2|A 2|A 1 1 2|h5gcis
5|c2|B 2|B 2|B 1 1 2|1i1wuay
5|c3|I 2|I 2|I 1 1 2|18t9d6q
5|a1|B 2x|B 2|B 2 1 1|cjze4i
5|a2|C 2x|C 2|C 2 1 1|a7yap4
5|a3|I 2x|I 2|I 2 1 1|1im6k0q
6|b|P -2y|P m|P 1 m 1|1wjxuhq
6|c|P -2|P m|P 1 1 m|47crzh
6|a|P -2x|P m|P m 1 1|1lbcdi5
7|b1|P -2yc|P c|P 1 c 1|1agl5n4
7|b2|P -2yac|P n|P 1 n 1|1luxsqb
7|b3|P -2ya|P a|P 1 a 1|5uac79
7|c1|P -2a|P a|P 1 1 a|161k6ps
7|c2|P -2ab|P n|P 1 1 n|v8uhrd
7|c3|P -2b|P b|P 1 1 b|ugpn5h
7|a1|P -2xb|P b|P b 1 1|r9gxlx
7|a2|P -2xbc|P n|P n 1 1|pfqf4
7|a3|P -2xc|P c|P c 1 1|jdd1v
8|b1|C -2y|C m|C 1 m 1|v73qtw
8|b2|A -2y|A m|A 1 m 1|92rj9k
8|b3|I -2y|I m|I 1 m 1|vprqie
8|c1|A -2|A m|A 1 1 m|1o3v4os
8|c2|B -2|B m|B 1 1 m|1tgwtr6
8|c3|I -2|I m|I 1 1 m|ilnzy2
8|a1|B -2x|B m|B m 1 1|1d30gqe
8|a2|C -2x|C m|C m 1 1|9h7q4s
8|a3|I -2x|I m|I m 1 1|thixu6
9|b1|C -2yc|C c|C 1 c 1|b46fzd
9|b2|A -2yab|A n|A 1 n 1|9tqbgi
9|b3|I -2ya|I a|I 1 a 1|ii6kz5
9|-b1|A -2ya|A a|A 1 a 1|r5h3yv
9|-b2|C -2yac|C n|C 1 n 1|17lreo0
9|-b3|I -2yc|I c|I 1 c 1|etae7r
9|c1|A -2a|A a|A 1 1 a|1m3unq9
9|c2|B -2ab|B n|B 1 1 n|1w59np0
9|c3|I -2b|I b|I 1 1 b|5e764m
9|-c1|B -2b|B b|B 1 1 b|89drx2
9|-c2|A -2ab|A n|A 1 1 n|1lhta6g
9|-c3|I -2a|I a|I 1 1 a|15vb6ej
9|a1|B -2xb|B b|B b 1 1|11matoe
9|a2|C -2xac|C n|C n 1 1|1hy47uu
9|a3|I -2xc|I c|I c 1 1|kcgynx
9|-a1|C -2xc|C c|C c 1 1|1fexh47
9|-a2|B -2xab|B n|B n 1 1|1hy0xhs
9|-a3|I -2xb|I b|I b 1 1|xp35q6
10|b|-P 2y|P 2/m|P 1 2/m 1|1rz8e0x
10|c|-P 2|P 2/m|P 1 1 2/m|193eqnv
10|a|-P 2x|P 2/m|P 2/m 1 1|fmvuxp
11|b|-P 2yb|P 21/m|P 1 21/m 1|sc4zft
11|c|-P 2c|P 21/m|P 1 1 21/m|1g1h0af
11|a|-P 2xa|P 21/m|P 21/m 1 1|psx8wp
12|b1|-C 2y|C 2/m|C 1 2/m 1|12j54q4
12|b2|-A 2y|A 2/m|A 1 2/m 1|qv6svg
12|b3|-I 2y|I 2/m|I 1 2/m 1|5vo9w0
12|c1|-A 2|A 2/m|A 1 1 2/m|4mx2n0
12|c2|-B 2|B 2/m|B 1 1 2/m|ygsd68
12|c3|-I 2|I 2/m|I 1 1 2/m|1s00bnc
12|a1|-B 2x|B 2/m|B 2/m 1 1|15hg9n0
12|a2|-C 2x|C 2/m|C 2/m 1 1|pp4dz4
12|a3|-I 2x|I 2/m|I 2/m 1 1|1v0s8x8
13|b1|-P 2yc|P 2/c|P 1 2/c 1|f4fuyx
13|b2|-P 2yac|P 2/n|P 1 2/n 1|1aklia1
13|b3|-P 2ya|P 2/a|P 1 2/a 1|ee2q0x
13|c1|-P 2a|P 2/a|P 1 1 2/a|sq1mmx
13|c2|-P 2ab|P 2/n|P 1 1 2/n|kamw7z
13|c3|-P 2b|P 2/b|P 1 1 2/b|4wadwz
13|a1|-P 2xb|P 2/b|P 2/b 1 1|gswkjp
13|a2|-P 2xbc|P 2/n|P 2/n 1 1|1d7rw09
13|a3|-P 2xc|P 2/c|P 2/c 1 1|pffegx
14|b1|-P 2ybc|P 21/c|P 1 21/c 1|1ynjfex
14|b2|-P 2yn|P 21/n|P 1 21/n 1|33slhl
14|b3|-P 2yab|P 21/a|P 1 21/a 1|f1hqzj
14|c1|-P 2ac|P 21/a|P 1 1 21/a|enb88t
14|c2|-P 2n|P 21/n|P 1 1 21/n|1oxymp1
14|c3|-P 2bc|P 21/b|P 1 1 21/b|q6vl17
14|a1|-P 2xab|P 21/b|P 21/b 1 1|rdbiyz
14|a2|-P 2xn|P 21/n|P 21/n 1 1|160gtlx
14|a3|-P 2xac|P 21/c|P 21/c 1 1|7zxoet
15|b1|-C 2yc|C 2/c|C 1 2/c 1|t1y4z4
15|b2|-A 2yab|A 2/n|A 1 2/n 1|1cbxydm
15|b3|-I 2ya|I 2/a|I 1 2/a 1|1wh59l0
15|-b1|-A 2ya|A 2/a|A 1 2/a 1|159nb3y
15|-b2|-C 2yac|C 2/n|C 1 2/n 1|dbtvhm
15|-b3|-I 2yc|I 2/c|I 1 2/c 1|5h5jvs
15|c1|-A 2a|A 2/a|A 1 1 2/a|knkhnm
15|c2|-B 2ab|B 2/n|B 1 1 2/n|1dhpj8e
15|c3|-I 2b|I 2/b|I 1 1 2/b|whal0q
15|-c1|-B 2b|B 2/b|B 1 1 2/b|g060ci
15|-c2|-A 2ab|A 2/n|A 1 1 2/n|jo838y
15|-c3|-I 2a|I 2/a|I 1 1 2/a|1grs0es
15|a1|-B 2xb|B 2/b|B 2/b 1 1|1btj2h6
15|a2|-C 2xac|C 2/n|C 2/n 1 1|eb26ju
15|a3|-I 2xc|I 2/c|I 2/c 1 1|ke4dzk
15|-a1|-C 2xc|C 2/c|C 2/c 1 1|ux8k9o
15|-a2|-B 2xab|B 2/n|B 2/n 1 1|jr0p66
15|-a3|-I 2xb|I 2/b|I 2/b 1 1|fxsjx6
16||P 2 2|P 2 2 2||16v2gmp
17||P 2c 2|P 2 2 21||16ud8ml
17|cab|P 2a 2a|P 21 2 2||qzsfrp
17|bca|P 2 2b|P 2 21 2||1f5h1ux
18||P 2 2ab|P 21 21 2||5kfman
18|cab|P 2bc 2|P 2 21 21||195hoo5
18|bca|P 2ac 2ac|P 21 2 21||sqsjj5
19||P 2ac 2ab|P 21 21 21||1qxhks5
20||C 2c 2|C 2 2 21||kh4j1o
20|cab|A 2a 2a|A 21 2 2||6c07os
20|bca|B 2 2b|B 2 21 2||1i72him
21||C 2 2|C 2 2 2||gxinh8
21|cab|A 2 2|A 2 2 2||77ycnw
21|bca|B 2 2|B 2 2 2||bq445s
22||F 2 2|F 2 2 2||5b7py6
23||I 2 2|I 2 2 2||1412yq8
24||I 2b 2c|I 21 21 21||ujog88
25||P 2 -2|P m m 2||1qcn71h
25|cab|P -2 2|P 2 m m||1tyocpv
25|bca|P -2 -2|P m 2 m||380vjj
26||P 2c -2|P m c 21||1yzyhtl
26|ba-c|P 2c -2c|P c m 21||1tt51ph
26|cab|P -2a 2a|P 21 m a||wqdbj7
26|-cba|P -2 2a|P 21 a m||1h8n7ar
26|bca|P -2 -2b|P b 21 m||3aboof
26|a-cb|P -2b -2|P m 21 b||fnzd07
27||P 2 -2c|P c c 2||yrbnq5
27|cab|P -2a 2|P 2 a a||1bsndc1
27|bca|P -2b -2b|P b 2 b||yeco6v
28||P 2 -2a|P m a 2||myk45x
28|ba-c|P 2 -2b|P b m 2||83yerh
28|cab|P -2b 2|P 2 m b||iajncr
28|-cba|P -2c 2|P 2 c m||xonf5r
28|bca|P -2c -2c|P c 2 m||7nhpsr
28|a-cb|P -2a -2a|P m 2 a||zpz0st
29||P 2c -2ac|P c a 21||32359
29|ba-c|P 2c -2b|P b c 21||1sqbvdq
29|cab|P -2b 2a|P 21 a b||1kazmq2
29|-cba|P -2ac 2a|P 21 c a||14zehxb
29|bca|P -2bc -2c|P c 21 b||1fpp6xk
29|a-cb|P -2a -2ab|P b 21 a||zy43c2
30||P 2 -2bc|P n c 2||1ym3ut9
30|ba-c|P 2 -2ac|P c n 2||1gozxkd
30|cab|P -2ac 2|P 2 n a||5qvghx
30|-cba|P -2ab 2|P 2 a n||1uk4ydj
30|bca|P -2ab -2ab|P b 2 n||sjcsgz
30|a-cb|P -2bc -2bc|P n 2 b||b0jm5r
31||P 2ac -2|P m n 21||x68ved
31|ba-c|P 2bc -2bc|P n m 21||kvgzfh
31|cab|P -2ab 2ab|P 21 m n||134znt1
31|-cba|P -2 2ac|P 21 n m||1weh7v
31|bca|P -2 -2bc|P n 21 m||17l79xz
31|a-cb|P -2ab -2|P m 21 n||2fm727
32||P 2 -2ab|P b a 2||1cufs0z
32|cab|P -2bc 2|P 2 c b||uech37
32|bca|P -2ac -2ac|P c 2 a||1vtuoap
33||P 2c -2n|P n a 21||1yxo6xw
33|ba-c|P 2c -2ab|P b n 21||bp7o2u
33|cab|P -2bc 2a|P 21 n b||1r90vag
33|-cba|P -2n 2a|P 21 c n||cjccee
33|bca|P -2n -2ac|P c 21 n||1xkss0t
33|a-cb|P -2ac -2n|P n 21 a||6ruvdh
34||P 2 -2n|P n n 2||ka1rql
34|cab|P -2n 2|P 2 n n||16mvmr1
34|bca|P -2n -2n|P n 2 n||4dz6d5
35||C 2 -2|C m m 2||g2kbew
35|cab|A -2 2|A 2 m m||guygrw
35|bca|B -2 -2|B m 2 m||9dv5z8
36||C 2c -2|C m c 21||1f2b2m0
36|ba-c|C 2c -2c|C c m 21||f31i2o
36|cab|A -2a 2a|A 21 m a||obyjs6
36|-cba|A -2 2a|A 21 a m||1pozwio
36|bca|B -2 -2b|B b 21 m||1ms4ehw
36|a-cb|B -2b -2|B m 21 b||ifdhdw
37||C 2 -2c|C c c 2||f1lvbc
37|cab|A -2a 2|A 2 a a||xml6li
37|bca|B -2b -2b|B b 2 b||1hml78c
38||A 2 -2|A m m 2||1v39dqo
38|ba-c|B 2 -2|B m m 2||ee5gbo
38|cab|B -2 2|B 2 m m||dus86w
38|-cba|C -2 2|C 2 m m||1cmxxbg
38|bca|C -2 -2|C m 2 m||1q8hvko
38|a-cb|A -2 -2|A m 2 m||1ou6mkg
39||A 2 -2b|A e m 2||y2g3q0
39|ba-c|B 2 -2a|B m e 2||4fui8a
39|cab|B -2a 2|B 2 e m||rkzxfu
39|-cba|C -2a 2|C 2 m e||8nap2k
39|bca|C -2a -2a|C m 2 e||89kmuy
39|a-cb|A -2b -2b|A e 2 m||1w8u6xg
40||A 2 -2a|A m a 2||u1r8j2
40|ba-c|B 2 -2b|B b m 2||1f9txw2
40|cab|B -2b 2|B 2 m b||1vpyr72
40|-cba|C -2c 2|C 2 c m||1c3kha8
40|bca|C -2c -2c|C c 2 m||mmi0hi
40|a-cb|A -2a -2a|A m 2 a||fbtjow
41||A 2 -2ab|A e a 2||1dzujnq
41|ba-c|B 2 -2ab|B b e 2||rl4gji
41|cab|B -2ab 2|B 2 e b||15r8eyu
41|-cba|C -2ac 2|C 2 c e||1rv053a
41|bca|C -2ac -2ac|C c 2 e||1gepc0c
41|a-cb|A -2ab -2ab|A e 2 a||ifkkxk
42||F 2 -2|F m m 2||1vhadpe
42|cab|F -2 2|F 2 m m||1d4rs62
42|bca|F -2 -2|F m 2 m||2310oa
43||F 2 -2d|F d d 2||zkcqpy
43|cab|F -2d 2|F 2 d d||1sr4382
43|bca|F -2d -2d|F d 2 d||1mku92q
44||I 2 -2|I m m 2||1l18op0
44|cab|I -2 2|I 2 m m||l5lrbs
44|bca|I -2 -2|I m 2 m||aop6ro
45||I 2 -2c|I b a 2||1j1ev58
45|cab|I -2a 2|I 2 c b||nkxwu0
45|bca|I -2b -2b|I c 2 a||1dldtvw
46||I 2 -2a|I m a 2||kz2j0k
46|ba-c|I 2 -2b|I b m 2||1miijf6
46|cab|I -2b 2|I 2 m b||1ygjuxy
46|-cba|I -2c 2|I 2 c m||v49sq8
46|bca|I -2c -2c|I c 2 m||uqfe9q
46|a-cb|I -2a -2a|I m 2 a||1kkf9qe
47||-P 2 2|P m m m|P 2/m 2/m 2/m|1276usf
48|1|P 2 2 -1n|P n n n|P 2/n 2/n 2/n|7wpy5p
48|2|-P 2ab 2bc|P n n n|P 2/n 2/n 2/n|1c9rgvp
49||-P 2 2c|P c c m|P 2/c 2/c 2/m|1c3r5rr
49|cab|-P 2a 2|P m a a|P 2/m 2/a 2/a|1ofaneb
49|bca|-P 2b 2b|P b m b|P 2/b 2/m 2/b|tizq87
50|1|P 2 2 -1ab|P b a n|P 2/b 2/a 2/n|xpftkt
50|2|-P 2ab 2b|P b a n|P 2/b 2/a 2/n|fenlbh
50|1cab|P 2 2 -1bc|P n c b|P 2/n 2/c 2/b|1uiy5xz
50|2cab|-P 2b 2bc|P n c b|P 2/n 2/c 2/b|19qfb0f
50|1bca|P 2 2 -1ac|P c n a|P 2/c 2/n 2/a|1l9el0l
50|2bca|-P 2a 2c|P c n a|P 2/c 2/n 2/a|bdu7tf
51||-P 2a 2a|P m m a|P 21/m 2/m 2/a|x36bmp
51|ba-c|-P 2b 2|P m m b|P 2/m 21/m 2/b|v5qrin
51|cab|-P 2 2b|P b m m|P 2/b 21/m 2/m|qvl9jr
51|-cba|-P 2c 2c|P c m m|P 2/c 2/m 21/m|1gl6xfz
51|bca|-P 2c 2|P m c m|P 2/m 2/c 21/m|fysxtb
51|a-cb|-P 2 2a|P m a m|P 21/m 2/a 2/m|vqt48h
52||-P 2a 2bc|P n n a|P 2/n 21/n 2/a|1wpct6j
52|ba-c|-P 2b 2n|P n n b|P 21/n 2/n 2/b|199gur5
52|cab|-P 2n 2b|P b n n|P 2/b 2/n 21/n|1l6rkar
52|-cba|-P 2ab 2c|P c n n|P 2/c 21/n 2/n|mj6af9
52|bca|-P 2ab 2n|P n c n|P 21/n 2/c 2/n|132cdfn
52|a-cb|-P 2n 2bc|P n a n|P 2/n 2/a 21/n|1w5z4a3
53||-P 2ac 2|P m n a|P 2/m 2/n 21/a|131lim3
53|ba-c|-P 2bc 2bc|P n m b|P 2/n 2/m 21/b|s4rg3n
53|cab|-P 2ab 2ab|P b m n|P 21/b 2/m 2/n|gkk6c5
53|-cba|-P 2 2ac|P c n m|P 21/c 2/n 2/m|2asavl
53|bca|-P 2 2bc|P n c m|P 2/n 21/c 2/m|1l1h2af
53|a-cb|-P 2ab 2|P m a n|P 2/m 21/a 2/n|infc4b
54||-P 2a 2ac|P c c a|P 21/c 2/c 2/a|18dihbt
54|ba-c|-P 2b 2c|P c c b|P 2/c 21/c 2/b|1gpccpr
54|cab|-P 2a 2b|P b a a|P 2/b 21/a 2/a|1dykivx
54|-cba|-P 2ac 2c|P c a a|P 2/c 2/a 21/a|qnkmf7
54|bca|-P 2bc 2b|P b c b|P 2/b 2/c 21/b|2ob3lv
54|a-cb|-P 2b 2ab|P b a b|P 21/b 2/a 2/b|1uq8b93
55||-P 2 2ab|P b a m|P 21/b 21/a 2/m|2q613t
55|cab|-P 2bc 2|P m c b|P 2/m 21/c 21/b|r5p14z
55|bca|-P 2ac 2ac|P c m a|P 21/c 2/m 21/a|cs6541
56||-P 2ab 2ac|P c c n|P 21/c 21/c 2/n|1xsl6t3
56|cab|-P 2ac 2bc|P n a a|P 2/n 21/a 21/a|axn9f9
56|bca|-P 2bc 2ab|P b n b|P 21/b 2/n 21/b|1xktf0v
57||-P 2c 2b|P b c m|P 2/b 21/c 21/m|vwp67r
57|ba-c|-P 2c 2ac|P c a m|P 21/c 2/a 21/m|rnlzj5
57|cab|-P 2ac 2a|P m c a|P 21/m 2/c 21/a|1iq8ttd
57|-cba|-P 2b 2a|P m a b|P 21/m 21/a 2/b|pye1wn
57|bca|-P 2a 2ab|P b m a|P 21/b 21/m 2/a|8yl14f
57|a-cb|-P 2bc 2c|P c m b|P 2/c 21/m 21/b|bm80w3
58||-P 2 2n|P n n m|P 21/n 21/n 2/m|v60mxt
58|cab|-P 2n 2|P m n n|P 2/m 21/n 21/n|t5kvm3
58|bca|-P 2n 2n|P n m n|P 21/n 2/m 21/n|n6elm1
59|1|P 2 2ab -1ab|P m m n|P 21/m 21/m 2/n|i2494v
59|2|-P 2ab 2a|P m m n|P 21/m 21/m 2/n|b9d0qb
59|1cab|P 2bc 2 -1bc|P n m m|P 2/n 21/m 21/m|yeldnf
59|2cab|-P 2c 2bc|P n m m|P 2/n 21/m 21/m|fcg8bj
59|1bca|P 2ac 2ac -1ac|P m n m|P 21/m 2/n 21/m|9h9gaz
59|2bca|-P 2c 2a|P m n m|P 21/m 2/n 21/m|au5dtt
60||-P 2n 2ab|P b c n|P 21/b 2/c 21/n|91ai4n
60|ba-c|-P 2n 2c|P c a n|P 2/c 21/a 21/n|7c0f8l
60|cab|-P 2a 2n|P n c a|P 21/n 21/c 2/a|vu0syl
60|-cba|-P 2bc 2n|P n a b|P 21/n 2/a 21/b|11ugyf1
60|bca|-P 2ac 2b|P b n a|P 2/b 21/n 21/a|ln5llv
60|a-cb|-P 2b 2ac|P c n b|P 21/c 21/n 2/b|13ylj9t
61||-P 2ac 2ab|P b c a|P 21/b 21/c 21/a|1mwxo6v
61|ba-c|-P 2bc 2ac|P c a b|P 21/c 21/a 21/b|qo4omv
62||-P 2ac 2n|P n m a|P 21/n 21/m 21/a|1jmo2x5
62|ba-c|-P 2bc 2a|P m n b|P 21/m 21/n 21/b|q5hq4l
62|cab|-P 2c 2ab|P b n m|P 21/b 21/n 21/m|xyw1cn
62|-cba|-P 2n 2ac|P c m n|P 21/c 21/m 21/n|17b2lsh
62|bca|-P 2n 2a|P m c n|P 21/m 21/c 21/n|1udnn1x
62|a-cb|-P 2c 2n|P n a m|P 21/n 21/a 21/m|cdgpd3
63||-C 2c 2|C m c m|C 2/m 2/c 21/m|2scqjw
63|ba-c|-C 2c 2c|C c m m|C 2/c 2/m 21/m|4goa04
63|cab|-A 2a 2a|A m m a|A 21/m 2/m 2/a|zn1kyg
63|-cba|-A 2 2a|A m a m|A 21/m 2/a 2/m|13xtnm0
63|bca|-B 2 2b|B b m m|B 2/b 21/m 2/m|18sr5x8
63|a-cb|-B 2b 2|B m m b|B 2/m 21/m 2/b|z1lheo
64||-C 2ac 2|C m c e|C 2/m 2/c 21/e|1rl0awo
64|ba-c|-C 2ac 2ac|C c m e|C 2/c 2/m 21/e|d32qjc
64|cab|-A 2ab 2ab|A e m a|A 21/e 2/m 2/a|1ggefl8
64|-cba|-A 2 2ab|A e a m|A 21/e 2/a 2/m|koa6vc
64|bca|-B 2 2ab|B b e m|B 2/b 21/e 2/m|16xigs
64|a-cb|-B 2ab 2|B m e b|B 2/m 21/e 2/b|6mfeb4
65||-C 2 2|C m m m|C 2/m 2/m 2/m|m6mw6g
65|cab|-A 2 2|A m m m|A 2/m 2/m 2/m|eqenow
65|bca|-B 2 2|B m m m|B 2/m 2/m 2/m|etia0
66||-C 2 2c|C c c m|C 2/c 2/c 2/m|h9qyo
66|cab|-A 2a 2|A m a a|A 2/m 2/a 2/a|1625dfs
66|bca|-B 2b 2b|B b m b|B 2/b 2/m 2/b|rnwipk
67||-C 2a 2|C m m e|C 2/m 2/m 2/e|1idja1w
67|ba-c|-C 2a 2a|C m m e|C 2/m 2/m 2/e|zz17ck
67|cab|-A 2b 2b|A e m m|A 2/e 2/m 2/m|1dumsbc
67|-cba|-A 2 2b|A e m m|A 2/e 2/m 2/m|16zt3yg
67|bca|-B 2 2a|B m e m|B 2/m 2/e 2/m|18q45as
67|a-cb|-B 2a 2|B m e m|B 2/m 2/e 2/m|1exbedk
68|1|C 2 2 -1ac|C c c e|C 2/c 2/c 2/e|gfrjvk
68|2|-C 2a 2ac|C c c e|C 2/c 2/c 2/e|ne5mpe
68|1ba-c|C 2 2 -1ac|C c c e|C 2/c 2/c 2/e|gfrjvk
68|2ba-c|-C 2a 2c|C c c e|C 2/c 2/c 2/e|1htxyfq
68|1cab|A 2 2 -1ab|A e a a|A 2/e 2/a 2/a|s2y824
68|2cab|-A 2a 2b|A e a a|A 2/e 2/a 2/a|1imhmbk
68|1-cba|A 2 2 -1ab|A e a a|A 2/e 2/a 2/a|s2y824
68|2-cba|-A 2ab 2b|A e a a|A 2/e 2/a 2/a|1wx6w60
68|1bca|B 2 2 -1ab|B b e b|B 2/b 2/e 2/b|6r88i8
68|2bca|-B 2ab 2b|B b e b|B 2/b 2/e 2/b|1e3s5au
68|1a-cb|B 2 2 -1ab|B b e b|B 2/b 2/e 2/b|6r88i8
68|2a-cb|-B 2b 2ab|B b e b|B 2/b 2/e 2/b|xdtlyu
69||-F 2 2|F m m m|F 2/m 2/m 2/m|1yfgc82
70|1|F 2 2 -1d|F d d d|F 2/d 2/d 2/d|1v4ly5m
70|2|-F 2uv 2vw|F d d d|F 2/d 2/d 2/d|11krd1u
71||-I 2 2|I m m m|I 2/m 2/m 2/m|1hi1u6o
72||-I 2 2c|I b a m|I 2/b 2/a 2/m|151oew8
72|cab|-I 2a 2|I m c b|I 2/m 2/c 2/b|1k7oylo
72|bca|-I 2b 2b|I c m a|I 2/c 2/m 2/a|19gndrc
73||-I 2b 2c|I b c a|I 2/b 2/c 2/a|1iwsepy
73|ba-c|-I 2a 2b|I c a b|I 2/c 2/a 2/b|ihc9vy
74||-I 2b 2|I m m a|I 2/m 2/m 2/a|13h3og
74|ba-c|-I 2a 2a|I m m b|I 2/m 2/m 2/b|r44o7w
74|cab|-I 2c 2c|I b m m|I 2/b 2/m 2/m|os7his
74|-cba|-I 2 2b|I c m m|I 2/c 2/m 2/m|12hf9t8
74|bca|-I 2 2a|I m c m|I 2/m 2/c 2/m|1brv4jc
74|a-cb|-I 2c 2|I m a m|I 2/m 2/a 2/m|e9hd58
75||P 4|P 4||gtqkty
76||P 4w|P 41||h632k0
77||P 4c|P 42||nzon6a
78||P 4cw|P 43||1ylzqi
79||I 4|I 4||1ty05yg
80||I 4bw|I 41||pu98lu
81||P -4|P -4||1s9bttq
82||I -4|I -4||13cj0o8
83||-P 4|P 4/m||gkf0z
84||-P 4c|P 42/m||17np03
85|1|P 4ab -1ab|P 4/n||to7mk9
85|2|-P 4a|P 4/n||hhth2j
86|1|P 4n -1n|P 42/n||182672p
86|2|-P 4bc|P 42/n||4q3aff
87||-I 4|I 4/m||9pewys
88|1|I 4bw -1bw|I 41/a||bh27cm
88|2|-I 4ad|I 41/a||as0ku6
89||P 4 2|P 4 2 2||7fer14
90||P 4ab 2ab|P 4 21 2||ao360q
91||P 4w 2c|P 41 2 2||1af451i
92||P 4abw 2nw|P 41 21 2||j7k4vu
93||P 4c 2|P 42 2 2||1vayko0
94||P 4n 2n|P 42 21 2||1ok8rz6
95||P 4cw 2c|P 43 2 2||z7892m
96||P 4nw 2abw|P 43 21 2||s04nga
97||I 4 2|I 4 2 2||1de4kmk
98||I 4bw 2bw|I 41 2 2||13etc1y
99||P 4 -2|P 4 m m||9mgosk
100||P 4 -2ab|P 4 b m||wn8ej2
101||P 4c -2c|P 42 c m||1sxkznw
102||P 4n -2n|P 42 n m||1mvv2xa
103||P 4 -2c|P 4 c c||19j81q0
104||P 4 -2n|P 4 n c||1eb2p5i
105||P 4c -2|P 42 m c||io5ekw
106||P 4c -2ab|P 42 b c||1n1jj2c
107||I 4 -2|I 4 m m||1nas57g
108||I 4 -2c|I 4 c m||b5dsyw
109||I 4bw -2|I 41 m d||108xysq
110||I 4bw -2c|I 41 c d||gqy5cg
111||P -4 2|P -4 2 m||1aolais
112||P -4 2c|P -4 2 c||157sc9g
113||P -4 2ab|P -4 21 m||1r1ojl6
114||P -4 2n|P -4 21 c||8mzd0m
115||P -4 -2|P -4 m 2||1p0g1sg
116||P -4 -2c|P -4 c 2||1hz9bvk
117||P -4 -2ab|P -4 b 2||6g644q
118||P -4 -2n|P -4 n 2||1c1kybi
119||I -4 -2|I -4 m 2||bec41k
120||I -4 -2c|I -4 c 2||7qxmw0
121||I -4 2|I -4 2 m||1peqdio
122||I -4 2bw|I -4 2 d||bi9jgk
123||-P 4 2|P 4/m m m|P 4/m 2/m 2/m|rfrcnn
124||-P 4 2c|P 4/m c c|P 4/m 2/c 2/c|mvwmn
125|1|P 4 2 -1ab|P 4/n b m|P 4/n 2/b 2/m|1ro65d1
125|2|-P 4a 2b|P 4/n b m|P 4/n 2/b 2/m|129a2xx
126|1|P 4 2 -1n|P 4/n n c|P 4/n 2/n 2/c|16h2tz1
126|2|-P 4a 2bc|P 4/n n c|P 4/n 2/n 2/c|1xs603b
127||-P 4 2ab|P 4/m b m|P 4/m 21/b 2/m|1xmqu3r
128||-P 4 2n|P 4/m n c|P 4/m 21/n 2/c|10cghoz
129|1|P 4ab 2ab -1ab|P 4/n m m|P 4/n 21/m 2/m|eca0or
129|2|-P 4a 2a|P 4/n m m|P 4/n 21/m 2/m|1fogn9p
130|1|P 4ab 2n -1ab|P 4/n c c|P 4/n 21/c 2/c|1rix6t3
130|2|-P 4a 2ac|P 4/n c c|P 4/n 21/c 2/c|m2jhcj
131||-P 4c 2|P 42/m m c|P 42/m 2/m 2/c|1m82srb
132||-P 4c 2c|P 42/m c m|P 42/m 2/c 2/m|156y9az
133|1|P 4n 2c -1n|P 42/n b c|P 42/n 2/b 2/c|qpws0r
133|2|-P 4ac 2b|P 42/n b c|P 42/n 2/b 2/c|1f6dmwn
134|1|P 4n 2 -1n|P 42/n n m|P 42/n 2/n 2/m|uld70z
134|2|-P 4ac 2bc|P 42/n n m|P 42/n 2/n 2/m|1ezl73t
135||-P 4c 2ab|P 42/m b c|P 42/m 21/b 2/c|ftc563
136||-P 4n 2n|P 42/m n m|P 42/m 21/n 2/m|139vc8p
137|1|P 4n 2n -1n|P 42/n m c|P 42/n 21/m 2/c|odtpl7
137|2|-P 4ac 2a|P 42/n m c|P 42/n 21/m 2/c|12zgd7
138|1|P 4n 2ab -1n|P 42/n c m|P 42/n 21/c 2/m|1h8bh8n
138|2|-P 4ac 2ac|P 42/n c m|P 42/n 21/c 2/m|167klq9
139||-I 4 2|I 4/m m m|I 4/m 2/m 2/m|1i2354k
140||-I 4 2c|I 4/m c m|I 4/m 2/c 2/m|uu9kfw
141|1|I 4bw 2bw -1bw|I 41/a m d|I 41/a 2/m 2/d|dakftm
141|2|-I 4bd 2|I 41/a m d|I 41/a 2/m 2/d|1b3ur20
142|1|I 4bw 2aw -1bw|I 41/a c d|I 41/a 2/c 2/d|1gw37aq
142|2|-I 4bd 2c|I 41/a c d|I 41/a 2/c 2/d|1m1332u
143||P 3|P 3||tyvz4s
144||P 31|P 31||vq96hc
145||P 32|P 32||1g0jzl4
146|H|R 3|R 3||8genk8
146|R|P 3*|R 3||1qnzjvb
147||-P 3|P -3||9k8g8c
148|H|-R 3|R -3||tqhoz2
148|R|-P 3*|R -3||kw5q3l
149||P 3 2|P 3 1 2||16h5yle
150||P 3 2"|P 3 2 1||96m9k7
151||P 31 2 (0 0 4)|P 31 1 2||171hmn4
152||P 31 2"|P 31 2 1||1f39lap
153||P 32 2 (0 0 2)|P 32 1 2||gqcrky
154||P 32 2"|P 32 2 1||1kyk4kp
155|H|R 3 2"|R 3 2||1c7d27l
155|R|P 3* 2|R 3 2||1xu1hyd
156||P 3 -2"|P 3 m 1||15fv84o
157||P 3 -2|P 3 1 m||cut49x
158||P 3 -2"c|P 3 c 1||1m385xe
159||P 3 -2c|P 3 1 c||62rj1r
160|H|R 3 -2"|R 3 m||s85r4m
160|R|P 3* -2|R 3 m||682xxe
161|H|R 3 -2"c|R 3 c||1ab8d72
161|R|P 3* -2n|R 3 c||m6hzy7
162||-P 3 2|P -3 1 m|P -3 1 2/m|tutvcf
163||-P 3 2c|P -3 1 c|P -3 1 2/c|5pxi73
164||-P 3 2"|P -3 m 1|P -3 2/m 1|ca9i6b
165||-P 3 2"c|P -3 c 1|P -3 2/c 1|1ofozy7
166|H|-R 3 2"|R -3 m|R -3 2/m|1uzbymh
166|R|-P 3* 2|R -3 m|R -3 2/m|nwdt56
167|H|-R 3 2"c|R -3 c|R -3 2/c|w8172l
167|R|-P 3* 2n|R -3 c|R -3 2/c|1ihtgdw
168||P 6|P 6||b31p9e
169||P 61|P 61||uxfm0y
170||P 65|P 65||rnuqlk
171||P 62|P 62||otc8r4
172||P 64|P 64||l3q210
173||P 6c|P 63||t7udis
174||P -6|P -6||1htqao5
175||-P 6|P 6/m||1u8v8hf
176||-P 6c|P 63/m||1dj42ln
177||P 6 2|P 6 2 2||5v4wwv
178||P 61 2 (0 0 5)|P 61 2 2||d9qvpt
179||P 65 2 (0 0 1)|P 65 2 2||2vwazv
180||P 62 2 (0 0 4)|P 62 2 2||15gxjgr
181||P 64 2 (0 0 2)|P 64 2 2||hv3v3n
182||P 6c 2c|P 63 2 2||1s6vec3
183||P 6 -2|P 6 m m||127nmuj
184||P 6 -2c|P 6 c c||1mfqobj
185||P 6c -2|P 63 c m||107draf
186||P 6c -2c|P 63 m c||k02d93
187||P -6 2|P -6 m 2||14wzjqr
188||P -6c 2|P -6 c 2||15gpezn
189||P -6 -2|P -6 2 m||70hjpv
190||P -6c -2c|P -6 2 c||apkycz
191||-P 6 2|P 6/m m m|P 6/m 2/m 2/m|rhrlyb
192||-P 6 2c|P 6/m c c|P 6/m 2/c 2/c|644wcv
193||-P 6c 2|P 63/m c m|P 63/m 2/c 2/m|any2iv
194||-P 6c 2c|P 63/m m c|P 63/m 2/m 2/c|1rtntub
195||P 2 2 3|P 2 3||maslv9
196||F 2 2 3|F 2 3||1vds91e
197||I 2 2 3|I 2 3||9nfkik
198||P 2ac 2ab 3|P 21 3||szzyfj
199||I 2b 2c 3|I 21 3||154faow
200||-P 2 2 3|P m -3|P 2/m -3|hky662
201|1|P 2 2 3 -1n|P n -3|P 2/n -3|ngwf06
201|2|-P 2ab 2bc 3|P n -3|P 2/n -3|gxwkq
202||-F 2 2 3|F m -3|F 2/m -3|1aeilho
203|1|F 2 2 3 -1d|F d -3|F 2/d -3|uohfe0
203|2|-F 2uv 2vw 3|F d -3|F 2/d -3|v64cw
204||-I 2 2 3|I m -3|I 2/m -3|1d9k94c
205||-P 2ac 2ab 3|P a -3|P 21/a -3|c162je
206||-I 2b 2c 3|I a -3|I 21/a -3|12teeq
207||P 4 2 3|P 4 3 2||1hqybsu
208||P 4n 2 3|P 42 3 2||sl3mqc
209||F 4 2 3|F 4 3 2||1e3nlvc
210||F 4d 2 3|F 41 3 2||9omjl8
211||I 4 2 3|I 4 3 2||7wdpvc
212||P 4acd 2ab 3|P 43 3 2||1hwjfes
213||P 4bd 2ab 3|P 41 3 2||1sr63eo
214||I 4bd 2c 3|I 41 3 2||1bq7xz8
215||P -4 2 3|P -4 3 m||t7ndhj
216||F -4 2 3|F -4 3 m||18izfai
217||I -4 2 3|I -4 3 m||23e0xc
218||P -4n 2 3|P -4 3 n||1uqb7ol
219||F -4a 2 3|F -4 3 c||p0jmle
220||I -4bd 2c 3|I -4 3 d||1d48jwq
221||-P 4 2 3|P m -3 m|P 4/m -3 2/m|12bqnnz
222|1|P 4 2 3 -1n|P n -3 n|P 4/n -3 2/n|1j9cx1b
222|2|-P 4a 2bc 3|P n -3 n|P 4/n -3 2/n|1kv0pb9
223||-P 4n 2 3|P m -3 n|P 42/m -3 2/n|1hbmtwh
224|1|P 4n 2 3 -1n|P n -3 m|P 42/n -3 2/m|1g6nkxh
224|2|-P 4bc 2bc 3|P n -3 m|P 42/n -3 2/m|1g6bgud
225||-F 4 2 3|F m -3 m|F 4/m -3 2/m|1ph4ika
226||-F 4a 2 3|F m -3 c|F 4/m -3 2/c|q67ypq
227|1|F 4d 2 3 -1d|F d -3 m|F 41/d -3 2/m|1bpl2a2
227|2|-F 4vw 2vw 3|F d -3 m|F 41/d -3 2/m|1c7hpye
228|1|F 4d 2 3 -1ad|F d -3 c|F 41/d -3 2/c|198kxba
228|2|-F 4ud 2vw 3|F d -3 c|F 41/d -3 2/c|5dz12a
229||-I 4 2 3|I m -3 m|I 4/m -3 2/m|1l4qzpw
230||-I 4bd 2c 3|I a -3 d|I 41/a -3 2/d|j535co
`;
