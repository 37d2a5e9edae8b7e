export const DI_URI = "http://opcfoundation.org/UA/DI/";
export const MACHINERY_URI = "http://opcfoundation.org/UA/Machinery/";

/** Models that the retrofit starter needs beneath: OPC 10000-100 and OPC 40001-1. */
export const retrofitRequiredModels: readonly string[] = [DI_URI, MACHINERY_URI];
