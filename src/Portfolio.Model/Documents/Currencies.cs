using System.Collections.Frozen;

namespace Portfolio.Model.Documents;

/// <summary>Codes of currencies that money can be stated in.</summary>
public static class Currencies
{
    // ISO 4217 list one with its amendments to 2025. Codes withdrawn since 2021 stay, so that older books can still be read;
    // metals, units of account, the test code and "no currency" are left out, because they have no minor unit.
    private static readonly FrozenSet<string> Codes = """
        AED AFN ALL AMD ANG AOA ARS AUD AWG AZN BAM BBD BDT BGN BHD BIF BMD BND BOB BOV BRL BSD BTN BWP BYN BZD CAD CDF CHE CHF CHW CLF
        CLP CNY COP COU CRC CUC CUP CVE CZK DJF DKK DOP DZD EGP ERN ETB EUR FJD FKP GBP GEL GHS GIP GMD GNF GTQ GYD HKD HNL HRK HTG HUF
        IDR ILS INR IQD IRR ISK JMD JOD JPY KES KGS KHR KMF KPW KRW KWD KYD KZT LAK LBP LKR LRD LSL LYD MAD MDL MGA MKD MMK MNT MOP MRU
        MUR MVR MWK MXN MXV MYR MZN NAD NGN NIO NOK NPR NZD OMR PAB PEN PGK PHP PKR PLN PYG QAR RON RSD RUB RWF SAR SBD SCR SDG SEK SGD
        SHP SLE SLL SOS SRD SSP STN SVC SYP SZL THB TJS TMT TND TOP TRY TTD TWD TZS UAH UGX USD USN UYI UYU UYW UZS VED VES VND VUV WST
        XAF XCD XCG XOF XPF YER ZAR ZMW ZWG ZWL
        """.Split((char[]?)null, StringSplitOptions.RemoveEmptyEntries).ToFrozenSet(StringComparer.Ordinal);

    /// <summary>True for an ISO 4217 code in capitals that has a minor unit.</summary>
    public static bool Exists(string code) => Codes.Contains(code);
}
