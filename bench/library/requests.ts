/** Queries of the list route as people ask them. */
export const REQUESTS: readonly { readonly name: string; readonly query: string }[] = [
  { name: 'last change first', query: '' },
  { name: 'page 50', query: `cursor=${Buffer.from('4900').toString('base64url')}` },
  { name: 'by name', query: 'sort=name' },
  { name: 'by variables, most first', query: 'sort=variables&direction=descending' },
  { name: 'by machine', query: 'sort=machine' },
  { name: 'by longest chain', query: 'sort=longest' },
  { name: 'by best energy', query: 'sort=best' },
  { name: 'one word', query: 'q=berths' },
  { name: 'three words, few found', query: 'q=alder+returned+77' },
  { name: 'nothing found', query: 'q=zzz' },
  { name: 'a tag', query: 'tag=winter' },
  { name: 'a state', query: 'state=to+carry+over' },
  {
    name: 'all at once',
    query: 'q=crew&tag=winter&tag=Deck&form=qubo&state=embedded&sort=longest&direction=descending',
  },
]
