namespace Portfolio.Store;

/// <summary>An open transaction of the store. Others receive it only to let rows of their own stand or fall with a write.</summary>
public sealed class StoreTransaction
{
    internal StoreTransaction()
    {
    }
}
