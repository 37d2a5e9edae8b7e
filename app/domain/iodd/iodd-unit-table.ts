/**
 * @generated table: IODD unit code, UN/CEFACT common code (empty where none fits), symbol; tab separated.
 *
 * Codes and symbols: IODDStandardUnitDefinitions V1.1.5 (IO-Link Community, 2024-02-01). UN/CEFACT codes: the table of
 * OPC 30120 Annex C, each checked to exist in the UNECE_to_OPCUA table of OPC 10000-8; for 1011, 1082, 1083, 1141, 1342,
 * 1352, 1422, 1423 and 1997, where that annex has no usable row, the UN/CEFACT row of the same unit is taken instead.
 */
export const ioddUnitTable = `1000	KEL	K
1001	CEL	°C
1002	FAH	°F
1003	A48	°R
1004	C81	㎭
1005	DD	°
1006	D61	'
1007	D62	"
1008	A91	gon
1009	C80	r
1010	MTR	m
1011	KMT	km
1012	CMT	cm
1013	MMT	mm
1014	4H	µm
1015	C45	nm
1016	C52	pm
1017	A11	Å
1018	FOT	ft
1019	INH	in
1020	YRD	yd
1021	SMI	mile
1022	NMI	nautical mile
1023	MTK	m²
1024	KMK	km²
1025	CMK	cm²
1026	DMK	dm²
1027	MMK	mm²
1028	ARE	a
1029	HAR	ha
1030	INK	in²
1031	FTK	ft²
1032	YDK	yd²
1033	MIK	mile²
1034	MTQ	m³
1035	DMQ	dm³
1036	CMQ	cm³
1037	MMQ	mm³
1038	LTR	L
1039	CLT	cl
1040	MLT	ml
1041	HLT	hl
1042	INQ	in³
1043	FTQ	ft³
1044	YDQ	yd³
1045	M69	mile³
1046	PT	pint
1047	QTI	quart
1048	A76	gal
1049	G3	Imp.gal
1050	BUA	bushel
1051	BLD	bbl
1052	J57	bbl (liq)
1053		ft³ std.
1054	SEC	s
1055	B52	ks
1056	C26	ms
1057	B98	µs
1058	MIN	min
1059	HUR	h
1060	DAY	d
1061	MTS	m/s
1062	C16	mm/s
1063	M60	m/h
1064	KMH	km/h
1065	KNT	knot
1066	IU	in/s
1067	FS	ft/s
1068	M64	yd/s
1069	M63	in/min
1070	FR	ft/min
1071	M65	yd/min
1072		in/h
1073	K14	ft/h
1074	M66	yd/h
1075	HM	mi/h
1076	MSK	m/s²
1077	HTZ	Hz
1078	D29	THz
1079	A86	GHz
1080	MHZ	MHz
1081	KHZ	kHz
1082	C97	1/s
1083	C94	1/min
1084	RPS	r/s
1085	RPM	rpm
1086	2A	㎭/s
1087	2B	1/s²
1088	KGM	kg
1089	GRM	g
1090	MGM	mg
1091	2U	Mg
1092	TNE	t
1093	ONZ	oz
1094	LBR	lb
1095		tn. sh.
1096		tn. l.
1097	KMQ	kg/m³
1098	B72	Mg/m³
1099	B34	kg/dm³
1100	23	g/cm³
1101	A93	g/m³
1102		t/m³
1103	B35	kg/L
1104	GJ	g/ml
1105	GL	g/L
1106	LA	lb/in³
1107	87	lb/ft³
1108	GE	lb/gal
1109		tn. sh./yd³
1110		°Twad
1111		°Baum (hv)
1112		°Baum (lt)
1113		°API
1114		SGU
1115	KL	kg/m
1116	C12	mg/m
1117		tex
1118	B32	kg·m²
1119	B31	kg·m/s
1120	NEW	N
1121	B73	MN
1122	B47	kN
1123	C20	mN
1124	B92	µN
1125		kg·m²/s
1126	NU	N·m
1127	B74	MN·m
1128	B48	kN·m
1129	D83	mN·m
1130	PAL	Pa
1131	A89	GPa
1132	MPA	MPa
1133	KPA	kPa
1134	74	mPa
1135	B96	µPa
1136	A97	hPa
1137	BAR	bar
1138	MBR	mbar
1139	UA	torr
1140	ATM	atm
1141	PS	psi
1142		psia
1143		psig
1144	K31	gf/cm²
1145	E42	kgf/cm²
1146	F78	inH2O
1147		inH2O (4 °C)
1148		inH2O (68 °F)
1149		mmH2O
1150		mmH2O (4 °C)
1151		mmH2O (68 °F)
1152	K24	ftH2O
1153		ftH2O (4 °C)
1154		ftH2O (68 °F)
1155	F79	inHg
1156		inHg (0 °C)
1157		mmHg
1158		mmHg (0 °C)
1159	C65	Pa·s
1160	S4	m²/s
1161	89	P
1162	C7	cP
1163	91	St
1164	4C	cSt
1165	4P	N/m
1166	C22	mN/m
1167	JOU	J
1168	A68	EJ
1169	C68	PJ
1170	D30	TJ
1171	GV	GJ
1172	3B	MJ
1173	KJO	kJ
1174	C15	mJ
1175	WHR	W·h
1176	D32	TW·h
1177	GWH	GW·h
1178	MWH	MW·h
1179	KWH	kW·h
1180	J75	cal
1181	K51	kcal
1182		Mcal
1183	N66	Btu
1184		datherm
1185	85	ft·lbf
1186	WTT	W
1187	D31	TW
1188	A90	GW
1189	MAW	MW
1190	KWT	kW
1191	C31	mW
1192	D80	µW
1193	C49	nW
1194	C75	pW
1195		Mcal/h
1196		MJ/h
1197		Btu/h
1198	K43	hp
1199	D53	W/(m·K)
1200	D55	W/(m²·K)
1201	D19	m²·K/W
1202	JE	J/K
1203	B41	kJ/K
1204	B11	J/(kg·K)
1205	B43	kJ/(kg·K)
1206	J2	J/kg
1207	JK	MJ/kg
1208	B42	kJ/kg
1209	AMP	A
1210	B22	kA
1211	4K	mA
1212	B84	µA
1213	C39	nA
1214	C70	pA
1215	COU	C
1216	D77	MC
1217	B26	kC
1218	B86	µC
1219	C40	nC
1220	C71	pC
1221	AMH	A·h
1222	A29	C/m³
1223	A30	C/mm³
1224	A28	C/cm³
1225	B27	kC/m³
1226	D88	mC/m³
1227	B87	µC/m³
1228	A34	C/m²
1229	A35	C/mm²
1230	A33	C/cm²
1231	B28	kC/m²
1232	D89	mC/m²
1233	B88	µC/m²
1234	D50	V/m
1235	B79	MV/m
1236	B55	kV/m
1237	D47	V/cm
1238	C30	mV/m
1239	C3	µV/m
1240	VLT	V
1241	B78	MV
1242	KVT	kV
1243	2Z	mV
1244	D82	µV
1245	FAR	F
1246	C10	mF
1247	4O	µF
1248	C41	nF
1249	4T	pF
1250	A69	F/m
1251	H28	µF/m
1252	C42	nF/m
1253	C72	pF/m
1254	A26	C·m
1255	A41	A/m²
1256	B66	MA/m²
1257	A4	A/cm²
1258	B23	kA/m²
1259	AE	A/m
1260	B24	kA/m
1261	A2	A/cm
1262	D33	T
1263	C29	mT
1264	D81	µT
1265	C48	nT
1266	WEB	Wb
1267	C33	mWb
1268	D59	Wb/m
1269	B56	kWb/m
1270	81	H
1271	C14	mH
1272	B90	µH
1273	C43	nH
1274	C73	pH
1275	A98	H/m
1276	B91	µH/m
1277	C44	nH/m
1278	A5	A·m²
1279	P49	N·m²/A
1280	P50	Wb·m
1281	OHM	Ω
1282	A87	GΩ
1283	B75	MΩ
1284	B49	kΩ
1285	E45	mΩ
1286	B94	µΩ
1287	SIE	S
1288	B53	kS
1289	C27	mS
1290	B99	µS
1291	C61	Ω·m
1292	A88	GΩ·m
1293	B76	MΩ·m
1294	B50	kΩ·m
1295	C60	Ω·cm
1296	C23	mΩ·m
1297	B95	µΩ·m
1298	C46	nΩ·m
1299	D10	S/m
1300	B77	MS/m
1301	B54	kS/m
1302	H61	mS/cm
1303		µS/mm
1304	H10	1/H
1305	D27	sr
1306	D57	W/sr
1307	D58	W/(sr·m²)
1308		W/m²
1309	LUM	lm
1310	B62	lm·s
1311	B59	lm·h
1312	B60	lm/m²
1313	B61	lm/W
1314	LUX	lx
1315	B64	lx·s
1316	CDL	cd
1317	A24	cd/m²
1318	F29	g/s
1319	F28	g/min
1320	F27	g/h
1321	F26	g/d
1322	KGS	kg/s
1323	F31	kg/min
1324	E93	kg/h
1325	F30	kg/d
1326	L81	t/s
1327	L79	t/min
1328		t/h
1329		t/d
1330		lb/s
1331		lb/min
1332	4U	lb/h
1333		lb/d
1334		tn. sh./s
1335		tn. sh./min
1336		tn. sh./h
1337		tn. sh./d
1338		tn. l./s
1339		tn. l./min
1340		tn. l./h
1341		tn. l./d
1342	P1	%
1343		% sol/wt
1344		% sol/vol
1345		% stm qual
1346		°Plato
1347	MQS	m³/s
1348	G53	m³/min
1349	MQH	m³/h
1350		m³/d
1351		L/s
1352	L2	L/min
1353		L/h
1354		L/d
1355		Ml/d
1356		ft³/s
1357		ft³/min
1358		ft³/h
1359	K22	ft³/d
1360	2L	ft³/min std.
1361		ft³/h std.
1362	K28	gal/s
1363		gal/min
1364	G50	gal/h
1365	K26	gal/d
1366		Mgal/d
1367	J61	Imp.gal/s
1368	J58	Imp.gal/min
1369		Imp.gal/h
1370	J59	Imp.gal/d
1371		bbl/s
1372		bbl/min
1373	J60	bbl/h
1374		bbl/d
1375	D54	kW/m²
1376	C32	mW/m²
1377	D85	µW/m²
1378	C76	pW/m²
1379	C66	Pa·s/m³
1380	C53	N·s/m
1381	C67	Pa·s/m
1382	M72	B
1383	2N	dB
1384	C34	mol
1385	B45	kmol
1386	C18	mmol
1387	FH	µmol
1388	D74	kg/mol
1389	A94	g/mol
1390	A40	m³/mol
1391	A37	dm³/mol
1392	A36	cm³/mol
1393	B58	L/mol
1394	B15	J/mol
1395	B44	kJ/mol
1396	B16	J/(mol·K)
1397	C36	mol/m³
1398	C35	mol/dm³
1399	C38	mol/L
1400	C19	mol/kg
1401	D87	mmol/kg
1402	BQL	Bq
1403	4N	MBq
1404	2Q	kBq
1405	A18	Bq/kg
1406	B25	kBq/kg
1407	B67	MBq/kg
1408	A95	Gy
1409	C13	mGy
1410		rad
1411	D13	Sv
1412	C28	mSv
1413	D91	rem
1414	CKG	C/kg
1415	C8	mC/kg
1416	2C	R
1417		1/J·m³
1419	A38	m³/C
1420	D48	V/K
1421	D49	mV/K
1422	Q30	pH
1423	59	ppm
1424		ppb
1425		ppth
1426		°Brix
1427		°Ball
1428		proof/vol
1429		proof/mass
1430		lb/Imp.gal
1431		kcal/s
1432		kcal/min
1433		kcal/h
1434		kcal/d
1435		Mcal/s
1436		Mcal/min
1437		Mcal/d
1438	P18	kJ/s
1439	P19	kJ/min
1440	P20	kJ/h
1441	P21	kJ/d
1442		MJ/s
1443		MJ/min
1444		MJ/d
1445		Btu/s
1446		Btu/min
1447		Btu/d
1448		µgal/s
1449		mgal/s
1450		kgal/s
1451		Mgal/s
1452		µgal/min
1453		mgal/min
1454		kgal/min
1455		Mgal/min
1456		µgal/h
1457		mgal/h
1458		kgal/h
1459		Mgal/h
1460		µgal/d
1461		mgal/d
1462		kgal/d
1463		µImp.gal/s
1464		mImp.gal/s
1465		kImp.gal/s
1466		MImp.gal/s
1467		µImp.gal/min
1468		mImp.gal/min
1469		kImp.gal/min
1470		MImp.gal/min
1471		µImp.gal/h
1472		mImp.gal/h
1473		kImp.gal/h
1474		MImp.gal/h
1475		µImp.gal/d
1476		mImp.gal/d
1477		kImp.gal/d
1478		MImp.gal/d
1479		µbbl/s
1480		mbbl/s
1481		kbbl/s
1482		Mbbl/s
1483		µbbl/min
1484		mbbl/min
1485		kbbl/min
1486		Mbbl/min
1487		µbbl/h
1488		mbbl/h
1489		kbbl/h
1490		Mbbl/h
1491		µbbl/d
1492		mbbl/d
1493		kbbl/d
1494		Mbbl/d
1495		µm³/s
1496		mm³/s
1497		km³/s
1498		Mm³/s
1499		µm³/min
1500		mm³/min
1501		km³/min
1502		Mm³/min
1503		µm³/h
1504		mm³/h
1505		km³/h
1506		Mm³/h
1507		µm³/d
1508		mm³/d
1509		km³/d
1510		Mm³/d
1511	2J	cm³/s
1512	G49	cm³/min
1513	G48	cm³/h
1514	G47	cm³/d
1515		kcal/kg
1516		Btu/lb
1517		kl
1518		kl/min
1519	4X	kl/h
1520		kl/d
1551	H43	S/cm
1552	G42	µS/cm
1553		mS/m
1554	G43	µS/m
1555		MΩ·cm
1556		kΩ·cm
1557		wt%
1558		mg/L
1559		µg/L
1560		% sat
1561		vpm
1562		%vol
1563	41	ml/min
1564	H63	mg/dm³
1566	GP	mg/m³
1567		ct
1568		lb (tr)
1569		oz (tr)
1570	OZA	fl oz (U.S.)
1572		af
1573		m³ normal
1574		L normal
1575		m³ std.
1576		L std.
1577	40	ml/s
1578	G55	ml/h
1579		ml/d
1580		af/s
1581		af/min
1582		af/h
1583		af/d
1584		fl oz (U.S.)/s
1585		fl oz (U.S.)/min
1586		fl oz (U.S.)/h
1587		fl oz (U.S.)/d
1588		m³/s normal
1589		m³/min normal
1590		m³/h normal
1591		m³/d normal
1592		L/s normal
1593		L/min normal
1594		L/h normal
1595		L/d normal
1596		m³/s std.
1597		m³/min std.
1598		m³/h std.
1599		m³/d std.
1600		L/s std.
1601		L/min std.
1602		L/h std.
1603		L/d std.
1604		ft³/s std.
1605		ft³/d std.
1606		oz/s
1607		oz/min
1608		oz/h
1609		oz/d
1610		Paa
1611		Pag
1612		GPaa
1613		GPag
1614		MPaa
1615		MPag
1616		kPaa
1617		kPag
1618		mPaa
1619		mPag
1620		µPaa
1621		µPag
1622		hPaa
1623		hPag
1624		gf/cm²a
1625		gf/cm²g
1626		kgf/cm²a
1627		kgf/cm²g
1628		SD4 °C
1629		SD15 °C
1630		SD20 °C
1631		PS
1632		ppt
1633		hl/s
1634		hl/min
1635		hl/h
1636		hl/d
1637		bbl (liq)/s
1638		bbl (liq)/min
1639		bbl (liq)/h
1640		bbl (liq)/d
1641		bbl (fed)
1642		bbl (fed)/s
1643		bbl (fed)/min
1644		bbl (fed)/h
1645		bbl (fed)/d
1646		var
1647		kvar
1648		Mvar
1649		var·h
1650		kvar·h
1651		Mvar·h
1652		VA
1653		kVA
1654		MVA
1655		VA·h
1656		kVA·h
1657		MVA·h
1658		g
1659		mg
1660		µg
1661		B
1662		kB
1663		MB
1664		GB
1665		TB
1666		KiB
1667		MiB
1668		GiB
1669		TiB
1670		m/s³
1671		nS/m
1672		mH2O
1673		mH2O (4 °C)
1674		mH2O (68 °F)
1675		B/s
1676		kB/s
1677		MB/s
1678		GB/s
1679		TB/s
1680		KiB/s
1681		MiB/s
1682		GiB/s
1683		TiB/s
1684		bit/s
1685		kbit/s
1686		Mbit/s
1687		Gbit/s
1688		Tbit/s
1689		dBm
1690		dBµV
1691		°/s
1692		°/s²
1693		㎭/s²
1694		bit
1695		kbit
1696		Mbit
1697		Gbit
1698		µm/m
1699		mV/V
1700		g·cm²
1701		°/s³
1702		mm/s²
1703		%/K
1704		°Ctd
1705		m/(s·K)
1706		kg/L normal
1707		1/K
1708		1/K²
1709		kg/m³ normal
1997	C62	`;
